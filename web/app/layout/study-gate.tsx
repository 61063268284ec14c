import { Outlet, useParams } from 'react-router-dom';
import { ButtonLink } from '../../components/button.tsx';
import { Page } from '../../components/page.tsx';
import { words } from '../../words/en.ts';
import { paths } from '../paths.ts';
import { forgetAnswers, useMembership } from '../session.ts';

let studyBefore: string | undefined;

/** Runs before a page of a study is drawn: what was read in another study is forgotten. */
export function studyLoader({ params }: { params: { study?: string } }): null {
  if (studyBefore !== undefined && studyBefore !== params.study) forgetAnswers();
  studyBefore = params.study;
  return null;
}

/** Pages of a study stand only before its members; for everyone else there is no such address. */
export function StudyGate() {
  const membership = useMembership();
  const { study } = useParams();
  return membership ? <Outlet key={study} /> : <NotFound />;
}

export function NotFound() {
  return (
    <Page heading={words.states.notFoundHeading} sentence={words.states.notFound}>
      <ButtonLink to={paths.home}>{words.states.notFoundNext}</ButtonLink>
    </Page>
  );
}

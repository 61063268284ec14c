import type { Place } from '../../../api/contracts/auth.ts';
import { rolesInWords } from '../../app/roles.ts';
import { useStudy } from '../../app/session.ts';
import { Page } from '../../components/page.tsx';
import { words } from '../../words/en.ts';
import { PlaceList } from './place-list.tsx';

const text = words.home;
/** What an owner who does not analyse only reads. */
const OWNER_READS: readonly Place[] = ['cuts', 'records'];

/** The start page of a study: the duty in words, and what may be done. */
export function StudyHomePage() {
  const membership = useStudy();
  const { roles, places, study } = membership;
  const [first] = roles;
  const reads = roles.includes('owner') && !roles.includes('analyst') ? OWNER_READS : [];
  const waiting = roles.flatMap((role) =>
    role in text.roles ? [text.roles[role as keyof typeof text.roles]] : [],
  );
  const heading =
    roles.length === 1 && first
      ? text.headings[first]
      : text.severalHeading(rolesInWords(membership));
  const sentence = study.masked ? text.maskedSentence(study.name) : text.openSentence(study.name);

  return (
    <Page heading={heading} sentence={sentence}>
      {waiting.map((sentenceOfRole) => (
        <p key={sentenceOfRole} className="mb-6 max-w-text">
          {sentenceOfRole}
        </p>
      ))}
      {places.length > 0 ? <PlaceList places={places} study={study.id} readOnly={reads} /> : null}
    </Page>
  );
}

import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { cutChoicesQueryOptions } from '../../app/cut-queries.ts';
import { paths } from '../../app/paths.ts';
import { useStudy } from '../../app/session.ts';
import { type Question, questionOf } from '../../app/specification-address.ts';
import { ButtonLink } from '../../components/button.tsx';
import { Page } from '../../components/page.tsx';
import { Answer, Empty, Failed, Forbidden, Loading } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { CheckReport } from './check-report.tsx';
import { checkQueryOptions } from './queries.ts';
import { QuestionForm } from './question-form.tsx';

const text = words.check;

export function CheckPage() {
  const { roles } = useStudy();
  if (roles.includes('analyst')) return <OpenToAnalysts />;
  return (
    <Page heading={text.heading}>
      <Forbidden sentence={text.forbidden} />
    </Page>
  );
}

function OpenToAnalysts() {
  const { study } = useStudy();
  const [params] = useSearchParams();
  const question = questionOf(params);
  const cuts = useQuery(cutChoicesQueryOptions(study.id));
  return (
    <Answer query={cuts}>
      {({ rows }) => {
        if (rows.length === 0) return <NoCut study={study.id} />;
        const form = <QuestionForm cuts={rows} />;
        return question ? (
          <Opened key={params.toString()} question={question} form={form} />
        ) : (
          <Page heading={text.heading} sentence={text.sentence}>
            {form}
          </Page>
        );
      }}
    </Answer>
  );
}

function NoCut({ study }: { study: string }) {
  return (
    <Page heading={text.noCutHeading}>
      <Empty
        what={text.noCut}
        act={
          <ButtonLink weight="filled" to={`${paths.cuts(study)}/new`}>
            {text.freeze}
          </ButtonLink>
        }
      />
    </Page>
  );
}

function Opened({ question, form }: { question: Question; form: React.ReactNode }) {
  const { study } = useStudy();
  const check = useQuery(checkQueryOptions(study.id, question));
  if (check.data) return <CheckReport check={check.data} question={question} form={form} />;
  return (
    <Page heading={text.heading} sentence={text.sentence}>
      {form}
      <div className="mt-6">
        {check.error ? (
          <Failed error={check.error} again={() => void check.refetch()} />
        ) : (
          <Loading what={text.computing} />
        )}
      </div>
    </Page>
  );
}

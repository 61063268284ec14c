import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { ImportView } from '../../../api/contracts/imports.ts';
import { useJob } from '../../app/jobs.ts';
import { paths } from '../../app/paths.ts';
import { sentenceOf } from '../../app/problem.ts';
import { useStudy } from '../../app/session.ts';
import { Button, ButtonLink } from '../../components/button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { Hash } from '../../components/hash.tsx';
import { notify } from '../../components/notices.tsx';
import { Facts, Page, Section } from '../../components/page.tsx';
import { Progress } from '../../components/progress.tsx';
import { Answer } from '../../components/states.tsx';
import { problems, words } from '../../words/en.ts';
import { fillSentence } from '../../words/problems.ts';
import { ApplyForm } from './apply-form.tsx';
import { MappingForm } from './mapping-form.tsx';
import { ImplausibleRows, OutcomeSentences, RefusedRows } from './outcome.tsx';
import { importChoicesQueryOptions, importQueryOptions, useCancelImport } from './queries.ts';

const text = words.imports;

export function ImportPage() {
  const { study } = useStudy();
  const { import: id = '' } = useParams();
  const view = useQuery(importQueryOptions(study.id, id));
  return <Answer query={view}>{(shown) => <Shown study={study.id} view={shown} />}</Answer>;
}

const HEADINGS: Partial<Record<ImportView['state'], string>> = {
  applied: text.appliedHeading,
  'nothing new': text.nothingNewHeading,
  cancelled: text.cancelledHeading,
};

function sentenceFor(view: ImportView): string {
  if (view.state === 'nothing new') return text.nothingNewSentence;
  if (view.state === 'cancelled') return text.cancelledSentence;
  if (view.state === 'applied' && view.counts) {
    const left = view.keepImplausible ? 0 : view.counts.implausible;
    return text.appliedSentence(view.counts.fresh - left);
  }
  return text.fileSentence(view.fileRows, view.measure.label);
}

function Shown({ study, view }: { study: string; view: ImportView }) {
  const working = view.state === 'checking' || view.state === 'applying';
  const open = view.state === 'uploaded' || view.state === 'checked' || view.state === 'failed';
  const applicable =
    view.state === 'checked' && view.counts && view.counts.fresh + view.counts.known > 0;
  return (
    <Page
      heading={HEADINGS[view.state] ?? view.fileName}
      sentence={sentenceFor(view)}
      aside={<Link to={paths.imports(study)}>{text.back}</Link>}
    >
      {view.problem ? <ProblemOf view={view} /> : null}
      {working ? <Work study={study} view={view} /> : null}
      {view.counts && !working ? (
        <Section heading={text.outcomeHeading}>
          <OutcomeSentences counts={view.counts} />
        </Section>
      ) : null}
      {view.counts && view.counts.refused > 0 && !working ? (
        <RefusedRows study={study} view={view} />
      ) : null}
      {applicable && view.counts ? (
        <>
          {view.counts.implausible > 0 ? <ImplausibleRows study={study} view={view} /> : null}
          <ApplyForm key={view.version} study={study} view={view} counts={view.counts} />
        </>
      ) : null}
      {open ? <Mapping study={study} view={view} /> : null}
      {view.state === 'applied' ? (
        <div className="mt-6">
          <ButtonLink to={paths.subjects(study)}>{text.toSubjects}</ButtonLink>
        </div>
      ) : null}
      <Section heading={text.aboutFile}>
        <Facts
          facts={[
            [text.name, view.fileName],
            [text.measure, view.measure.label],
            [text.state, text.states[view.state]],
            [text.hash, <Hash key="hash" value={view.fileSha256} />],
          ]}
        />
      </Section>
      {open ? <CancelImport study={study} view={view} /> : null}
    </Page>
  );
}

function ProblemOf({ view }: { view: ImportView }) {
  if (!view.problem) return null;
  const sentence = problems[view.problem.code] ?? words.states.failed;
  return (
    <p role="alert" className="mb-4 max-w-text border-l-4 border-stop pl-3">
      {fillSentence(sentence, view.problem.params)}
    </p>
  );
}

function Work({ study, view }: { study: string; view: ImportView }) {
  const client = useQueryClient();
  const cancel = useCancelImport(study);
  const job = useJob(view.jobId, () => {
    void client.invalidateQueries({ queryKey: importQueryOptions(study, view.id).queryKey });
    void client.invalidateQueries({ queryKey: ['imports', study] });
    void client.invalidateQueries({ queryKey: ['subjects', study] });
  });
  return (
    <Progress
      label={view.state === 'checking' ? text.checking : text.applying}
      done={job?.done ?? 0}
      total={job?.total ?? view.fileRows}
      cancel={() =>
        cancel.mutate(view.id, {
          onError: (error) => notify(sentenceOf(error), { urgent: true }),
          onSuccess: () => notify(text.cancelled),
        })
      }
    />
  );
}

function Mapping({ study, view }: { study: string; view: ImportView }) {
  const choices = useQuery(importChoicesQueryOptions(study));
  return (
    <Answer query={choices}>
      {(offered) => <MappingForm study={study} view={view} choices={offered} />}
    </Answer>
  );
}

function CancelImport({ study, view }: { study: string; view: ImportView }) {
  const [asking, setAsking] = useState(false);
  const cancel = useCancelImport(study);
  return (
    <div className="mt-6">
      <Button weight="quiet" onPress={() => setAsking(true)}>
        {text.cancel}
      </Button>
      <Dialog
        open={asking}
        onClose={() => setAsking(false)}
        heading={text.cancel}
        what={<p>{text.cancelWhat}</p>}
        act={text.cancel}
        onAct={async () => {
          await cancel.mutateAsync(view.id);
          notify(text.cancelled);
        }}
      />
    </div>
  );
}

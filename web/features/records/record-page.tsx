import { useQuery } from '@tanstack/react-query';
import { useCallback, useEffect, useMemo } from 'react';
import { useParams, useSearchParams } from 'react-router-dom';
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import { useStudy } from '../../app/session.ts';
import { formatDay } from '../../components/dates.ts';
import { formatCount } from '../../components/numbers.ts';
import { Page } from '../../components/page.tsx';
import { Stamp } from '../../components/stamp.tsx';
import { Answer } from '../../components/states.tsx';
import { words } from '../../words/en.ts';
import { Coefficients } from './coefficients.tsx';
import { headlineOf } from './headline.ts';
import type { RecordPartProps } from './part-props.ts';
import { PickedPanel } from './picked-panel.tsx';
import { PlotPart } from './plot-part.tsx';
import { recordQueryOptions } from './queries.ts';
import { RecordFacts } from './record-facts.tsx';
import { Signatures } from './signatures.tsx';
import { errorsText, recordSource } from './source.ts';
import { SubjectTable } from './subject-table.tsx';
import { TrendPart } from './trend-part.tsx';

const text = words.records;

export function RecordPage() {
  const { study } = useStudy();
  const { record = '' } = useParams();
  const query = useQuery(recordQueryOptions(study.id, record));
  return <Answer query={query}>{(data) => <Opened record={data} />}</Answer>;
}

/** The subject picked everywhere on the page; its opaque id stands in the address. */
function usePicked() {
  const [params, setParams] = useSearchParams();
  const onPick = useCallback(
    (id: string | null) =>
      setParams(
        (before) => {
          const next = new URLSearchParams(before);
          if (id === null) next.delete('subject');
          else next.set('subject', id);
          return next;
        },
        { replace: true, preventScrollReset: true },
      ),
    [setParams],
  );
  useEffect(() => {
    const clear = (event: KeyboardEvent) => {
      if (event.key === 'Escape' && !event.defaultPrevented) onPick(null);
    };
    document.addEventListener('keydown', clear);
    return () => document.removeEventListener('keydown', clear);
  }, [onPick]);
  return [params.get('subject'), onPick] as const;
}

function Opened({ record }: { record: RecordDetail }) {
  const { study } = useStudy();
  const [picked, onPick] = usePicked();
  const headline = useMemo(() => headlineOf(record), [record]);
  const source = useMemo(() => recordSource(study.name, record), [study.name, record]);
  const part: RecordPartProps = { record, source, picked, onPick };
  const { headline: counts } = record;
  return (
    <Page
      heading={headline.heading}
      sentence={
        <>
          {headline.below ? `${headline.below} ` : null}
          {text.under(
            counts.subjects,
            counts.readings,
            record.cut.number,
            formatDay(record.cut.visitCutoff),
          )}{' '}
          {errorsText(record, formatCount(counts.readings))}.{' '}
          {text.asked(
            words.analysis.purposes[record.purpose],
            record.specification.number,
            record.measure.label,
          )}
        </>
      }
      aside={record.stamp ? <Stamp text={record.stamp} /> : undefined}
    >
      <div className="grid gap-10 wide:grid-cols-[minmax(0,1fr)_340px]">
        <PlotPart {...part} headline={headline.heading} />
        <div className="grid content-start gap-10">
          <TrendPart {...part} />
          <PickedPanel {...part} />
        </div>
      </div>
      <Coefficients {...part} />
      <SubjectTable {...part} />
      <RecordFacts record={record} />
      <Signatures record={record} />
    </Page>
  );
}

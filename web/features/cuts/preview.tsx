/** What a cut would hold if it were frozen now, beside the form that asks for it. */
import type { UseQueryResult } from '@tanstack/react-query';
import type { CutPreview } from '../../../api/contracts/cuts.ts';
import { sentenceOf } from '../../app/problem.ts';
import { formatCount } from '../../components/numbers.ts';
import { Loading } from '../../components/states.tsx';
import { words } from '../../words/en.ts';

const text = words.cuts;

export function Preview(props: { query: UseQueryResult<CutPreview>; asked: boolean }) {
  const { query } = props;
  return (
    <aside aria-labelledby="cut-preview" className="wide:border-l wide:border-line wide:pl-6">
      <h2 id="cut-preview" className="text-17 font-semibold">
        {text.previewHeading}
      </h2>
      <div role="status" className={query.isPlaceholderData ? 'opacity-60' : undefined}>
        <Body {...props} />
      </div>
    </aside>
  );
}

function Body({ query, asked }: { query: UseQueryResult<CutPreview>; asked: boolean }) {
  if (!asked) return <p className="mt-1 text-faded">{text.previewWaiting}</p>;
  if (query.error)
    return <p className="mt-1 border-l-4 border-stop pl-2 text-stop">{sentenceOf(query.error)}</p>;
  const data = query.data;
  if (!data) return <Loading />;
  const figures: readonly (readonly [string, number])[] = [
    [text.subjects, data.subjects],
    [text.rows, data.rows],
    [text.readings, data.readings],
    [text.late(data.lateDays), data.late],
    [text.pending, data.pending],
  ];
  return (
    <dl className="mt-2">
      {figures.map(([name, value]) => (
        <div
          key={name}
          className="flex items-baseline justify-between gap-4 border-b border-line py-1.5"
        >
          <dt className="text-faded">{name}</dt>
          <dd className="figure">{formatCount(value)}</dd>
        </div>
      ))}
    </dl>
  );
}

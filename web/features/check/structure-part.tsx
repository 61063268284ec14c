import { formatCount, formatShare } from '../../components/numbers.ts';
import { words } from '../../words/en.ts';
import type { PartProps } from './part-props.ts';

const text = words.check;

export function StructurePart({ check }: PartProps) {
  const { structure, counts } = check;
  const names = text.structure;
  const leftOut = (['missing', 'censored', 'notDone', 'excluded', 'noTime', 'noGroup'] as const)
    .filter((kind) => counts[kind] > 0)
    .map((kind) => text.leftOutPart(counts[kind], text.leftOut[kind]));
  const figures: readonly (readonly [string, string])[] = [
    [names.subjects, formatCount(structure.subjects)],
    [names.readings, formatCount(structure.readings)],
    [names.repeating, formatCount(structure.subjects_with_repeats)],
    [
      names.repeats,
      names.repeatsOf(structure.repeats.min, structure.repeats.median, structure.repeats.max),
    ],
    [names.times, formatCount(structure.distinct_times)],
    [names.following, formatShare(structure.share_following)],
    [names.replicates, formatCount(structure.replicates)],
  ];
  return (
    <section>
      <h2 className="mb-2 text-17 font-semibold">{text.partHeadings.structure}</h2>
      <dl>
        {figures.map(([name, value]) => (
          <div
            key={name}
            className="flex items-baseline justify-between gap-4 border-b border-line py-1.5"
          >
            <dt className="text-faded">{name}</dt>
            <dd className="figure whitespace-nowrap">{value}</dd>
          </div>
        ))}
        <div className="border-b border-line py-1.5">
          <dt className="inline text-faded">{names.leftOut}</dt>{' '}
          <dd className="inline">
            {leftOut.length === 0
              ? text.leftOutNone
              : text.leftOutList(counts.rows - counts.used, leftOut)}
          </dd>
        </div>
      </dl>
    </section>
  );
}

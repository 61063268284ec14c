/** The picked subject: its follow-up as a cord, and its own line beside the others'. */

import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import { Cord } from '../../charts/cord/cord.tsx';
import { CordAxis } from '../../charts/cord/cord-axis.tsx';
import { cordScale } from '../../charts/cord/geometry.ts';
import type { CordVisit } from '../../charts/cord/types.ts';
import { Button } from '../../components/button.tsx';
import { formatCount, formatError, formatEstimate, formatLoose } from '../../components/numbers.ts';
import { notFittedReason } from '../../words/advice.ts';
import { slopeUnit } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';
import type { RecordPartProps } from './part-props.ts';

const text = words.records;
type Subject = RecordDetail['picture']['subjects'][number];

/** The readings of this measure as knots; what was planned besides is no part of a cut's picture. */
function knotsOf(subject: Subject, perWeek: number): CordVisit[] {
  return subject.readings.map((reading, index) => ({
    id: `${index} ${reading.visit}`,
    name: reading.visit,
    targetDay: null,
    day: reading.time * perWeek,
    windowFrom: null,
    windowTo: null,
    state: 'done',
    outOfWindow: false,
  }));
}

export function PickedPanel({ record, picked, onPick }: RecordPartProps) {
  const { picture, result, specification, measure } = record;
  const subject = picture.subjects.find(({ id }) => id === picked);
  if (!subject)
    return (
      <section>
        <h2 className="text-17 font-semibold">{text.pickedNone}</h2>
        <p className="text-faded">{text.pickedHow}</p>
      </section>
    );
  const inDays = specification.unit === 'weeks' ? 7 : 1;
  const all = picture.subjects.map((each) => ({ visits: knotsOf(each, inDays) }));
  const scale = cordScale(all);
  const knots = knotsOf(subject, inDays);
  const last = knots.at(-1)?.day ?? null;
  const own = result.per_subject?.lines.find((line) => line.subject === subject.code);
  const unit = slopeUnit(measure.unit, specification.unit);
  const withUnit = (name: string, of: string | null) => (of ? `${name}, ${of}` : name);
  const facts: (readonly [string, string])[] = [
    [text.pickedReadings, formatCount(subject.readings.length)],
  ];
  if (subject.group) facts.push([text.pickedGroup, subject.group]);
  if (own) {
    facts.push([withUnit(text.pickedOwn, unit), formatEstimate(own.slope, own.slope_se)]);
    if (own.slope_se !== null)
      facts.push([withUnit(text.pickedOwnError, unit), formatError(own.slope_se)]);
    facts.push([withUnit(text.pickedLevel, measure.unit), formatLoose(own.intercept)]);
  }
  if (typeof result.per_subject?.mean_slope === 'number')
    facts.push([withUnit(text.pickedMean, unit), formatLoose(result.per_subject.mean_slope)]);
  const why = result.per_subject?.not_fitted.find((each) => each.subject === subject.code);
  return (
    <section aria-live="polite">
      <div className="flex items-baseline justify-between gap-4">
        <h2 className="text-17 font-semibold">{text.pickedHeading(subject.code)}</h2>
        <Button weight="quiet" onPress={() => onPick(null)}>
          {text.unpick}
        </Button>
      </div>
      <CordAxis scale={scale} />
      <Cord
        visits={knots}
        today={null}
        endedAt={subject.ended ? endOf(subject, inDays, last) : null}
        endWord={subject.ended?.word ?? null}
        scale={scale}
      />
      <dl>
        {facts.map(([name, value]) => (
          <div
            key={name}
            className="flex items-baseline justify-between gap-4 border-b border-line py-1.5"
          >
            <dt>{name}</dt>
            <dd className="figure">{value}</dd>
          </div>
        ))}
        {why ? (
          <div className="border-b border-line py-1.5">
            <dt className="inline text-faded">{text.subjectColumns.why}:</dt>{' '}
            <dd className="inline">{notFittedReason(why)}</dd>
          </div>
        ) : null}
      </dl>
    </section>
  );
}

function endOf(subject: Subject, inDays: number, last: number | null): number | null {
  return subject.ended?.time == null ? last : subject.ended.time * inDays;
}

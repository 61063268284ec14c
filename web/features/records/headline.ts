/** The heading of a record: it states the finding, never its "significance". */
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import { slopeUnit } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';

const text = words.records;
/** Fewer degrees of freedom than this carry no p value and no finding. */
const FEW_DF = 4;

export type Estimate = {
  estimate: number;
  error: number | null;
  lower: number | null;
  upper: number | null;
  df: number | null;
  p: number | null;
};

/** A coefficient of the fit that was run, in one shape for pooled and ordinary fits. */
export function coefficientOf(record: RecordDetail, key: string): Estimate | null {
  const { result, fit } = record;
  if (fit === 'ordinary') {
    const ordinary = result.ols?.coefficients[key];
    return ordinary ? { ...ordinary, error: ordinary.se } : null;
  }
  const pooled = result.pooled?.coefficients[key];
  return pooled ? { ...pooled, error: pooled.se_cr2 } : null;
}

export function groupsOf(record: RecordDetail): readonly string[] {
  return record.specification.group ? (record.result.group_levels ?? []) : [];
}

export type Headline = { heading: string; below: string | null };

export function headlineOf(record: RecordDetail): Headline {
  const { label } = record.measure;
  const unit = slopeUnit(record.measure.unit, record.specification.unit);
  const groups = groupsOf(record);
  const [reference, second] = groups;
  const two = groups.length === 2 && reference !== undefined && second !== undefined;
  const of = coefficientOf(record, two ? 'time_by_group' : 'time');
  if (!of || (of.df !== null && of.df < FEW_DF))
    return { heading: text.tooFew(label), below: of ? text.tooFewEstimate(of, unit) : null };
  const { lower, upper } = of;
  if (lower === null || upper === null)
    return { heading: text.unbounded(label, of, unit), below: null };
  const unclear = lower <= 0 && upper >= 0;
  if (two)
    return {
      heading: unclear
        ? text.groupUnclear(label, of, unit, second, reference)
        : text.groupMore(label, of, unit, second, reference),
      below: null,
    };
  const heading = unclear
    ? text.unclear(label, of, unit)
    : of.estimate < 0
      ? text.falls(label, of, unit)
      : text.rises(label, of, unit);
  // With more than two groups the trend is that of the reference group.
  return { heading: reference ? text.inGroup(reference, heading) : heading, below: null };
}

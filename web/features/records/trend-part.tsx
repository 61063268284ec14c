/** The trend by each method that was computed, with its interval and figures. */
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import { type IntervalRow, Intervals } from '../../charts/intervals/intervals.tsx';
import { formatEstimate, formatInterval } from '../../components/numbers.ts';
import { coefficientName, inOrder, isTrend, slopeUnit } from '../../words/analysis.ts';
import { words } from '../../words/en.ts';
import { coefficientOf, groupsOf } from './headline.ts';
import type { RecordPartProps } from './part-props.ts';
import { recordFile } from './source.ts';

const text = words.records;

function pooledRow(record: RecordDetail, key: string, method: string, chief: boolean) {
  const of = record.result.pooled?.coefficients[key];
  if (!of) return [];
  return [
    {
      method,
      estimate: of.estimate,
      lower: of.lower,
      upper: of.upper,
      error: of.se_cr2,
      chief,
      note: text.dfNote(of.df, of.p),
    },
  ];
}

function wildRow(record: RecordDetail, key: string, method: string): IntervalRow[] {
  const wild = record.result.pooled?.wild_bootstrap?.[key];
  const of = record.result.pooled?.coefficients[key];
  if (!wild || !of) return [];
  return [
    {
      method,
      estimate: of.estimate,
      lower: wild.lower ?? null,
      upper: wild.upper ?? null,
      error: of.se_cr2,
      chief: false,
      note: text.wildNote(wild.p, wild.draws),
    },
  ];
}

function ordinaryRow(record: RecordDetail): IntervalRow[] {
  if (record.fit !== 'ordinary') return [];
  const of = coefficientOf(record, 'time');
  if (!of) return [];
  const method = record.stamp ? text.methods.ordinary : words.analysis.fits.ordinary;
  return [{ ...of, method, chief: true, note: text.dfNote(of.df, of.p) }];
}

function ownRow({ result }: RecordDetail): IntervalRow[] {
  const own = result.per_subject;
  if (typeof own?.mean_slope !== 'number') return [];
  const { mean_slope: mean, mean_slope_lower: lower, mean_slope_upper: upper } = own;
  return [
    {
      method: text.methods.own,
      estimate: mean,
      lower,
      upper,
      error: lower === null || upper === null ? null : (upper - lower) / 4,
      chief: false,
      note: lower === null ? text.noInterval : '',
    },
  ];
}

function rowsOf(record: RecordDetail): IntervalRow[] {
  const groups = groupsOf(record);
  const pooled = record.fit === 'pooled';
  if (groups.length < 2)
    return [
      ...ordinaryRow(record),
      ...pooledRow(record, 'time', text.methods.pooled, pooled),
      ...wildRow(record, 'time', text.methods.wild),
      ...ownRow(record),
    ];
  // Own lines do not use the group, so their mean answers another question.
  const keys = inOrder(Object.keys(record.result.pooled?.coefficients ?? {})).filter(isTrend);
  return keys.flatMap((key) => [
    ...pooledRow(record, key, coefficientName(key, groups), pooled && key !== 'time'),
    ...wildRow(record, key, text.methods.wildOf(coefficientName(key, groups))),
  ]);
}

export function TrendPart({ record, source }: RecordPartProps) {
  const rows = rowsOf(record);
  const unit = slopeUnit(record.measure.unit, record.specification.unit);
  if (rows.length === 0) return null;
  return (
    <Intervals
      rows={rows}
      unit={unit}
      picture={{
        title: groupsOf(record).length > 1 ? text.trendTitleGroups(unit) : text.trendTitle(unit),
        text: text.trendText(
          rows.map((row) =>
            text.trendPart(
              row.method,
              formatEstimate(row.estimate, row.error),
              row.lower === null || row.upper === null
                ? row.note || text.noInterval
                : formatInterval(row.lower, row.upper, row.error),
            ),
          ),
        ),
        source,
        stamp: record.stamp,
        fileName: recordFile(record, 'trend'),
      }}
    />
  );
}

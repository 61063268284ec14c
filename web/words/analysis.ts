/** Words that the check, fits and records share: times, units, coefficients, refusals. */
import { formatDf } from './numbers.ts';
import type { ProblemSentences } from './problems.ts';

type Axis = 'since_baseline' | 'planned_day';
type Unit = 'days' | 'weeks';

/** A label inside a sentence: "Sway path" reads "sway path", but "BMI" stays as it is. */
export function inSentence(label: string): string {
  return /^\p{Lu}\p{Ll}/u.test(label) ? label.charAt(0).toLowerCase() + label.slice(1) : label;
}

export function atStart(label: string): string {
  return label.charAt(0).toUpperCase() + label.slice(1);
}

export const timeNames: Readonly<Record<Axis, Readonly<Record<Unit, string>>>> = {
  since_baseline: { days: 'days since baseline', weeks: 'weeks since baseline' },
  planned_day: { days: 'planned day', weeks: 'planned week' },
};

export const perTime: Readonly<Record<Unit, string>> = { days: 'a day', weeks: 'a week' };

export function slopeUnit(unit: string | null, time: Unit): string {
  return unit ? `${unit} ${perTime[time]}` : perTime[time];
}

/** The name of a coefficient of time × group; `groups` with the reference first. */
export function coefficientName(key: string, groups: readonly string[]): string {
  const [reference = 'the reference group', second = 'the other group'] = groups;
  const grouped = groups.length > 1;
  const [kind = key, level = second] = key.split(':');
  if (kind === 'intercept') return grouped ? `Level at 0, ${reference}` : 'Level at 0';
  if (kind === 'time') return grouped ? `Trend, ${reference}` : 'Trend';
  if (kind === 'group') return `Level at 0, ${level} less ${reference}`;
  if (kind === 'time_by_group') return `Trend, ${level} less ${reference}`;
  return key;
}

/** Whether a coefficient is a change over time, so that its unit is one a week or a day. */
export function isTrend(key: string): boolean {
  return key.startsWith('time');
}

/** Coefficients as they are read: levels first, then trends, each with its reference before the differences. */
export function inOrder(keys: readonly string[]): string[] {
  const kinds = ['intercept', 'group', 'time', 'time_by_group'];
  const place = (key: string) => kinds.indexOf(key.split(':')[0] ?? '');
  return [...keys].sort((a, b) => place(a) - place(b) || (a < b ? -1 : 1));
}

export const analysisWords = {
  stamp: 'independence not met',
  fits: { pooled: 'Pooled line, cluster-robust errors', ordinary: 'Ordinary straight line' },
  purposes: { planned: 'planned', exploratory: 'exploratory' },
  axes: { since_baseline: 'Since baseline', planned_day: 'As planned' },
  axisLabel: 'Time axis',
  units: { days: 'days', weeks: 'weeks' },
  unitLabel: 'Unit of time',
  cutLabel: 'Cut',
  measureLabel: 'Measure',
  groupLabel: 'Compare the groups',
  cutName: (number: number, name: string) => `Cut ${number}, ${name}`,
  specification: (number: number, measure: string) =>
    `Specification ${number} of ${inSentence(measure)} on this cut`,
  df: (df: number | null) => `${formatDf(df)} degrees of freedom`,
  pooledErrors: (df: number | null) =>
    `Errors by subject (CR2, ${formatDf(df)} degrees of freedom)`,
  ordinaryErrors: (readings: string) => `Errors that take ${readings} readings as independent`,
  p: (p: string) => (p.startsWith('<') ? `p ${p}` : `p = ${p}`),
  noUnit: 'no unit',
} as const;

export const analysisProblems: ProblemSentences = {
  analysis_measure_unknown:
    'This cut holds no measure {measure}. Choose one of the cut, or freeze a cut that holds it.',
  analysis_measure_yes_no:
    '{measure} is answered by yes or no, and a straight line leaves 0 and 1 behind. Choose a continuous, positive or count measure.',
  analysis_measure_choice:
    '{measure} is a choice among words, and a straight line needs numbers. Choose a continuous, positive or count measure.',
  analysis_measure_once:
    '{measure} is read once per subject, so it has no course over time. Choose a measure that is read at visits.',
  analysis_group_masked:
    'This study is masked, so its readings are analysed together. Leave the group out.',
  analysis_group_none: 'The subjects of this cut belong to no groups. Leave the group out.',
  engine_no_usable_rows:
    'None of the {rows} rows of the cut has a value and a place on the time axis. Choose another measure or axis, or a later cut.',
  engine_too_few_subjects:
    'All readings are of subject {subject}. The check needs two subjects or more: choose a later cut.',
  engine_too_few_times:
    'All readings are at time {time}. A line needs two different times: choose a later cut or the other axis.',
  engine_too_few_readings:
    '{readings} readings can’t carry {parameters} coefficients. Choose a later cut, or leave the group out.',
  engine_out_of_scale:
    'Line {line} of the cut holds {value}, too far from other readings to compute with. Correct the reading and freeze a new cut, or exclude it with a reason.',
  engine_two_levels:
    'Subject {subject} stands in two groups, in line {line} of the cut. Leave the group out.',
  engine_one_level:
    'All readings belong to one group, so there is none to compare. Leave the group out.',
  engine_collinear:
    'The readings don’t tell {column} apart from the other coefficients, for example because a group was read at one time only. Leave the group out, or choose a later cut.',
  check_not_opened:
    'You have not opened the independence check of this specification. Open it first; then run the fit.',
  ordinary_fit_locked:
    'An ordinary straight line takes these readings as independent, but subjects repeat. Record at the foot of the check why it is wanted, in 20 characters or more.',
};

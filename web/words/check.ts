/** Words of the independence check: the consequence first, the statistic second. */
import { inSentence } from './analysis.ts';
import { counted, formatCount, formatDf, formatNumber, formatP, formatRatio } from './numbers.ts';

type Verdict =
  | 'no_repeats'
  | 'negative'
  | 'repeats_none_detected'
  | 'exchangeable'
  | 'serial'
  | 'exchangeable_and_serial';
type Caution = 'count' | 'censored';
type Interval = { estimate: number; lower: number | null; upper: number | null };

const readings = (count: number) => counted(count, 'reading', 'readings');
const subjects = (count: number) => counted(count, 'subject', 'subjects');
const interval = (of: Interval) =>
  `${formatRatio(of.estimate)}${of.lower === null || of.upper === null ? '' : `, 95 % interval ${formatRatio(of.lower)} to ${formatRatio(of.upper)}`}`;

export const checkWords = {
  heading: 'Check independence before any fit',
  sentence: 'Choose the cut, the measure and the time axis. Each question asked is counted.',
  forbidden: 'Analysts of the study open checks. Ask its owner for that role.',
  title: (measure: string) => `Independence check of ${inSentence(measure)}`,
  formLabel: 'What to check',
  open: 'Open the check',
  again: 'Check this instead',
  noCutHeading: 'There is no cut to check',
  noCut: 'The check reads a frozen cut. Freeze one first.',
  freeze: 'Freeze a cut',
  computing: 'Reading the cut and computing the check. Large cuts take some seconds.',
  natures: { yes_no: 'yes or no', choice: 'a choice', once: 'once per subject' },

  readings: (count: number) => `These ${formatCount(count)} readings are `,
  notIndependent: (count: number) => `not ${formatCount(count)} independent observations`,
  single: (count: number, of: number) =>
    `${readings(count)} of ${subjects(of)}: no subject repeats`,
  comeFrom: (of: number, repeating: number) =>
    repeating === of
      ? `They come from ${subjects(of)}, each with two or more.`
      : `They come from ${subjects(of)}, and ${formatCount(repeating)} of them ${repeating === 1 ? 'has' : 'have'} two or more.`,
  carry: 'For the mean they carry about as much as ',
  independentReadings: (count: number) => `${formatCount(count)} independent readings`,
  icc: (of: Interval) => ` (intraclass correlation ${interval(of)}).`,
  designOnly:
    'Independence can’t be examined from repeats here; it is taken from the design of the study.',
  quiet: (of: number) =>
    `No dependence was found, with ${subjects(of)}. That is no evidence of independence: readings of one subject repeat by design, so the warning stands.`,

  partHeadings: {
    structure: 'Structure',
    amount: 'Amount of dependence',
    consequence: 'What an ordinary straight line would get wrong',
    advice: 'Fits that suit these data',
  },
  structure: {
    subjects: 'Subjects',
    readings: 'Readings used',
    repeating: 'Subjects with two or more',
    repeats: 'Readings a subject: least, median, most',
    repeatsOf: (min: number, median: number, max: number) =>
      `${formatCount(min)}, ${formatNumber(median, Number.isInteger(median) ? 0 : 1)}, ${formatCount(max)}`,
    times: 'Different times',
    replicates: 'Replicates: second readings at one time',
    following: 'Readings that follow one of the same subject',
    leftOut: 'Rows left out',
  },
  leftOut: {
    missing: 'missing',
    censored: 'censored (below or above a limit)',
    notDone: 'not done',
    excluded: 'excluded',
    noTime: 'without a place on the time axis',
    noGroup: 'without a group',
  },
  leftOutNone: 'none',
  leftOutList: (total: number, parts: readonly string[]) =>
    `${formatCount(total)}: ${parts.join(', ')}`,
  leftOutPart: (count: number, what: string) => `${formatCount(count)} ${what}`,

  amount: {
    quantity: 'Quantity',
    value: 'Value',
    interval: '95 % interval',
    intervalOf: (lower: string, upper: string) => `${lower} to ${upper}`,
    icc: 'Intraclass correlation of the residuals',
    iccSays: 'Share of the spread that lies between subjects, once the line is taken away.',
    iccNegative:
      'Below zero: readings of one subject differ more than readings of different subjects.',
    iccResponse: 'Intraclass correlation of the readings',
    iccResponseSays: 'The same before the line is taken away.',
    designEffect: 'Design effect of the mean',
    designEffectSays:
      'How many times wider the variance of the mean is than of independent readings.',
    effective: 'Effective number of readings',
    effectiveSays: (of: number) => `Out of ${formatCount(of)}.`,
    effectiveMore: (of: number) =>
      `More than the ${formatCount(of)} taken, because the correlation is below zero.`,
    lr: 'Random intercept against none',
    lrValue: (lr: number) => `LR ${formatNumber(lr, 1)}`,
    lrSays: (p: number) => `p ${p < 0.001 ? '' : '= '}${formatP(p)}.`,
    permutation: 'Residuals dealt at random to subjects',
    permutationValue: (statistic: number) => `F ${formatNumber(statistic, 2)}`,
    permutationSays: (p: number, draws: number) =>
      `p ${p < 0.001 ? '' : '= '}${formatP(p)} from ${formatCount(draws)} deals.`,
  },

  observedTitle: (tethered: boolean) =>
    tethered
      ? 'As observed: readings hang together by subject'
      : 'As observed: residuals by subject',
  observedText: (measure: string, of: number, within: string, unit: string) =>
    `Residuals of ${inSentence(measure)} around the ordinary line, one column for each of ${subjects(of)}. The middle column spans ${within}${unit ? ` ${unit}` : ''}.`,
  dealtTitle: 'The dealt twin: the same residuals dealt at random',
  dealtText: (within: string, unit: string) =>
    `The same residuals on the same scale. Without dependence, columns would look like these: the middle one spans ${within}${unit ? ` ${unit}` : ''}.`,

  consequence: {
    coefficient: 'Coefficient',
    unit: 'Unit',
    ordinary: 'Ordinary error',
    robust: 'Cluster-robust error',
    ratio: 'Robust ÷ ordinary',
    bar: 'The ratio as a bar on a log scale',
    pOrdinary: 'Ordinary p',
    pRobust: 'Robust p',
    is: 'Ordinary error is',
    verdicts: {
      'too small': 'too small',
      'too large': 'too large',
      'about right': 'about right',
      unknown: 'not known',
    },
    caption: 'Ordinary and cluster-robust errors of each coefficient',
    note: 'Clustering works both ways: it hides uncertainty between subjects, and it adds noise that a comparison within subjects does not have. Cluster-robust: CR2 with Satterthwaite degrees of freedom. The dark bar is what a stable level of each subject alone would do (Moulton).',
    stampNote: 'The ordinary errors and p values stand here for comparison only.',
    title: (worst: { name: string; ratio: number; times: string } | null) =>
      worst === null
        ? 'What an ordinary straight line would get wrong'
        : worst.ratio > 1
          ? `Ordinary errors are ${worst.times} times too small for the ${inSentence(worst.name)}`
          : `Ordinary errors are ${worst.times} times too large for the ${inSentence(worst.name)}`,
    text: (parts: readonly string[]) => `Robust ÷ ordinary error: ${parts.join('; ')}.`,
    part: (name: string, ratio: number | null) => `${inSentence(name)} ${formatRatio(ratio)}`,
    df: (df: number | null) => `${formatDf(df)} df`,
  },

  typeHeadings: {
    no_repeats: 'Type: no repeats, so none can be seen',
    negative: 'Type: readings of one subject push apart',
    repeats_none_detected: 'Type: no dependence was found',
    exchangeable: 'Type: a stable level for each subject',
    serial: 'Type: likeness that fades with time',
    exchangeable_and_serial:
      'Type: a stable level for each subject, with a part that fades with time',
  } satisfies Record<Verdict, string>,
  typeNotJudged: 'Type: alike within subject',
  notJudged:
    'Whether the likeness fades with time is not judged by a fit here; see the pictures of time apart and of successive residuals.',
  serialCaution: 'Slopes that differ between subjects look alike.',
  variogramTitle: 'Two readings of one subject, by time apart',
  variogramText: (first: string, last: string, total: string, unit: string) =>
    `Half the squared difference of two residuals of one subject is ${first} at the shortest time apart and ${last} at the longest; between subjects it is ${total}${unit ? ` ${unit}` : ''}.`,
  variogramMissing: 'The variogram needs pairs of readings of one subject at different times.',
  successiveTitle: (lag1: number) => `Successive residuals: correlation ${formatRatio(lag1)}`,
  successiveTitleNone: 'Successive residuals',
  successiveText: (lag1: number, expected: number | null, p: number | null, draws: number | null) =>
    `Correlation ${formatRatio(lag1)}${expected === null ? '' : `, where ${formatRatio(expected)} is expected without serial order`}${p === null ? '' : `; p ${p < 0.001 ? '' : '= '}${formatP(p)}${draws === null ? '' : ` from ${formatCount(draws)} orders within subjects`}`}.`,
  successiveMissing: 'Successive residuals need subjects with two readings or more.',

  unless: (text: string) => `Unless: ${text}`,
  fitPooled: 'Fit the pooled line and each own line',
  cautions: {
    count:
      'This measure is a count. A straight line is a caution here: counts can’t fall below zero and spread more where they are high.',
    censored:
      'Some readings lie below or above a limit. They are counted apart and used in no line, so the line leans away from that limit.',
  } satisfies Record<Caution, string>,

  lockHeading: 'Ordinary straight line',
  locked: 'Ordinary straight line: locked.',
  lockWhy: (count: number) => `Its errors assume ${formatCount(count)} independent readings.`,
  lockOpen: 'Give a reason to open it',
  lockClose: 'Leave it closed',
  lockReason: 'Why an ordinary straight line is wanted',
  lockReasonHint:
    'Your reason is kept for this cut and specification, and everything from the fit carries the stamp “independence not met”.',
  lockCount: (count: number) =>
    count >= 20
      ? `${formatCount(count)} characters`
      : `${formatCount(count)} of at least 20 characters`,
  lockAct: 'Record the reason and open it',
  unlocked: 'Ordinary straight line: open.',
  unlockedBy: (name: string) => `Opened by ${name}, `,
  unlockedReason: (reason: string) => `Reason: ${reason}`,
  freely: 'No subject repeats, so an ordinary straight line is open without a reason.',
  fitOrdinary: 'Fit the ordinary line',

  source: (parts: {
    study: string;
    cut: string;
    specification: string;
    engine: string;
    seed: number;
  }) =>
    `${parts.study}. ${parts.cut}. ${parts.specification}. Independence check, engine ${parts.engine}, seed ${parts.seed}.`,
} as const;

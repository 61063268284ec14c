/** Words of analysis records and the pictures in them. */
import { atStart, inSentence } from './analysis.ts';
import {
  counted,
  decimalsForError,
  formatCount,
  formatDf,
  formatInterval,
  formatNumber,
  formatP,
} from './numbers.ts';
import type { ProblemSentences } from './problems.ts';

type Slope = {
  estimate: number;
  lower: number | null;
  upper: number | null;
  error: number | null;
};

const digits = (of: Slope) => decimalsForError(of.error) ?? 3;
const size = (value: number, of: Slope) => formatNumber(Math.abs(value), digits(of));

export const recordsWords = {
  heading: (total: number) =>
    total === 0
      ? 'No analysis is recorded yet'
      : `${counted(total, 'analysis is', 'analyses are')} recorded`,
  sentence:
    'Every run of a fit stands here, looked at or not. Open one to read, download or sign it.',
  empty: 'A record is written by each run of a fit. A fit begins in the independence check.',
  emptyOwner: 'No analyst has run a fit yet.',
  toCheck: 'Open the check',
  caption: 'Analysis records',
  noun: ['record', 'records'],
  columns: {
    at: 'Run',
    measure: 'Measure',
    cut: 'Cut',
    specification: 'Specification',
    fit: 'Fit',
    purpose: 'Purpose',
    trend: 'Trend',
    interval: '95 % interval',
    by: 'By',
    signed: 'Signed',
    stamp: 'Stamp',
  },
  filters: { measure: 'Measure', cut: 'Cut', fit: 'Fit', purpose: 'Purpose', signed: 'Signed' },
  fitNames: { pooled: 'pooled line', ordinary: 'ordinary line' },

  /** States the finding. */
  rises: (measure: string, of: Slope, unit: string) =>
    `${measure} rises by ${size(of.estimate, of)} ${unit}, 95 % interval ${formatInterval(of.lower, of.upper, of.error)}`,
  falls: (measure: string, of: Slope, unit: string) =>
    `${measure} falls by ${size(of.estimate, of)} ${unit}, 95 % interval ${formatNumber(Math.abs(of.upper ?? 0), digits(of))} to ${formatNumber(Math.abs(of.lower ?? 0), digits(of))}`,
  unclear: (measure: string, of: Slope, unit: string) =>
    `No clear trend in ${inSentence(measure)}: between a fall of ${size(of.lower ?? 0, of)} and a rise of ${size(of.upper ?? 0, of)} ${unit}`,
  unbounded: (measure: string, of: Slope, unit: string) =>
    `${measure} ${of.estimate < 0 ? 'falls' : 'rises'} by ${size(of.estimate, of)} ${unit}; there is no interval`,
  tooFew: (measure: string) => `Too few subjects to judge a trend in ${inSentence(measure)}`,
  tooFewEstimate: (of: Slope, unit: string) =>
    `Estimate ${formatNumber(of.estimate, digits(of))} ${unit}; labelled exploratory, because fewer than four degrees of freedom carry no p value.`,
  inGroup: (group: string, rest: string) => `In ${group}: ${inSentence(rest)}`,
  groupMore: (measure: string, of: Slope, unit: string, second: string, reference: string) =>
    `The trend in ${inSentence(measure)} is ${size(of.estimate, of)} ${unit} ${of.estimate < 0 ? 'lower' : 'higher'} in ${second} than in ${reference}, 95 % interval ${of.estimate < 0 ? formatInterval(-(of.upper ?? 0), -(of.lower ?? 0), of.error) : formatInterval(of.lower, of.upper, of.error)}`,
  groupUnclear: (measure: string, of: Slope, unit: string, second: string, reference: string) =>
    `No clear difference in the trend of ${inSentence(measure)} between ${second} and ${reference}: from ${size(of.lower ?? 0, of)} ${unit} lower to ${size(of.upper ?? 0, of)} higher`,
  under: (subjects: number, readings: number, cut: number, day: string) =>
    `${counted(subjects, 'subject', 'subjects')}, ${counted(readings, 'reading', 'readings')}, cut ${cut} of visits to ${day}.`,

  asked: (purpose: string, number: number, measure: string) =>
    `${atStart(purpose)}; specification ${number} of ${inSentence(measure)} on this cut.`,

  lineName: { pooled: 'pooled line', ordinary: 'ordinary straight line' },
  pictureTitle: (measure: string, time: string, grouped: boolean) =>
    `${measure} by ${time}, subject by subject${grouped ? ' and by group' : ''}`,
  pictureText: (headline: string, subjects: number, visits: number) =>
    `${headline}. ${counted(subjects, 'subject', 'subjects')}; the number of readings stands under each of ${counted(visits, 'visit', 'visits')}.`,
  trendTitle: (unit: string) => `Trend by method, ${unit}`,
  trendTitleGroups: (unit: string) => `Trends and their difference, ${unit}`,
  trendText: (parts: readonly string[]) => `${parts.join('. ')}.`,
  trendPart: (method: string, estimate: string, interval: string) =>
    `${method}: ${estimate}, ${interval}`,
  methods: {
    pooled: 'Cluster-robust pooled line (CR2)',
    ordinary: 'Ordinary line, independence not met',
    own: 'Mean of own lines',
    wild: 'Wild cluster bootstrap',
    wildOf: (name: string) => `${name}, wild bootstrap`,
  },
  wildNote: (p: number | null, draws: number) =>
    p === null
      ? '\u2014'
      : `p ${p <= 0 ? `< ${formatNumber(1 / draws, 4)}` : p < 0.001 ? formatP(p) : `= ${formatP(p)}`}`,
  dfNote: (df: number | null, p: number | null) =>
    df !== null && df < 4
      ? `${formatDf(df)} df, no p`
      : `${formatDf(df)} df, p ${p !== null && p < 0.001 ? '' : '= '}${formatP(p)}`,
  noInterval: 'no interval',

  pickedHeading: (code: string) => `${code}, picked`,
  pickedNone: 'No subject is picked',
  pickedHow: 'Pick one in the picture or the table to see it here and everywhere on this page.',
  pickedOwn: 'Own slope',
  pickedOwnError: 'Error of the own slope',
  pickedLevel: 'Own level at 0',
  pickedReadings: 'Readings',
  pickedGroup: 'Group',
  pickedMean: 'Mean of own slopes',
  unpick: 'Clear',

  coefficientsHeading: 'Coefficients',
  coefficientsCaption: 'Coefficients with their errors',
  coefficients: {
    name: 'Coefficient',
    unit: 'Unit',
    estimate: 'Estimate',
    error: 'Error',
    df: 'df',
    t: 't',
    p: 'p',
    interval: '95 % interval',
    cr0: 'CR0',
    cr1: 'CR1',
    cr1s: 'CR1 with the N − p factor',
    cr2: 'CR2',
    cr3: 'CR3',
    wild: 'Wild bootstrap p',
    webb: 'Webb p',
  },
  errorsHeading: 'All errors by subject',
  errorsShow: 'Show CR0 to CR3 and the wild bootstrap',
  wildFew:
    'With five subjects or fewer the enumerated p can’t fall below 0.05 and the interval has no end; the Webb p stands beside it.',
  groupTest: (f: number, df1: number, df2: number, p: number) =>
    `Joint test of all groups, small-sample: F ${formatNumber(f, 2)} on ${formatDf(df1)} and ${formatDf(df2)} df, p ${p < 0.001 ? '' : '= '}${formatP(p)}.`,
  fitted: (sigma: string, r2: string) => `Residual standard deviation ${sigma}; R² ${r2}.`,

  subjectsHeading: 'Each subject’s own straight line',
  subjectsSentence:
    'Own lines describe; they are not tested one by one. Sort by own slope to find who departs from the rest.',
  subjectsCaption: 'Own straight line of each subject',
  subjectsNoun: ['subject', 'subjects'],
  subjectColumns: {
    code: 'Subject',
    group: 'Group',
    n: 'Readings',
    slope: 'Own slope',
    slopeSe: 'Its own error',
    intercept: 'Own level at 0',
    ended: 'Follow-up',
    why: 'Why no line',
  },
  meanSlope: (k: number, mean: string, sd: string, unit: string) =>
    `${counted(k, 'own line', 'own lines')}: mean slope ${mean}, standard deviation ${sd} ${unit}.`,

  factsHeading: 'The record',
  facts: {
    run: 'Run',
    by: 'By',
    purpose: 'Purpose',
    cut: 'Cut',
    cutHash: 'Hash of the cut',
    specification: 'Specification',
    specificationHash: 'Hash of the specification',
    engine: 'Engine and seed',
    engineOf: (engine: string, seed: number) => `engine ${engine}, seed ${seed}`,
    counts: 'Rows of the cut',
    countsOf: (used: number, rows: number) => `${formatCount(used)} used of ${formatCount(rows)}`,
    acknowledgement: 'Ordinary fit opened',
    acknowledgementOf: (by: string, reason: string) => `by ${by}: ${reason}`,
    content: 'Hash of this record',
  },
  specificationNumber: (number: number, measure: string) =>
    `number ${number} of ${inSentence(measure)} on this cut`,
  download: 'Download the record (JSON)',
  downloadFailed: 'The record could not be read. Nothing was saved.',
  again: 'Open its check',

  signaturesHeading: 'Signatures',
  unsigned: 'Not signed yet. Running a fit and signing it are two acts.',
  signaturesCaption: 'Signatures of this record',
  signature: {
    name: 'Name',
    at: 'Signed',
    meaning: 'Meaning',
    hash: 'Content hash',
    holds: 'Holds',
  },
  signatureValid: 'the record is as it was signed',
  signatureBroken: 'the record is not what was signed',
  sign: 'Sign this record',
  signHeading: 'Sign this record',
  signWhat:
    'Your name, the time and the meaning are bound to this record. A signature can’t be taken back.',
  signed: 'The record is signed.',
  meanings: ['I ran this analysis', 'I reviewed this analysis'],

  source: (parts: {
    study: string;
    cut: string;
    day: string;
    cutHash: string;
    specification: string;
    fit: string;
    errors: string;
    subjects: number;
    readings: number;
    engine: string;
    seed: number;
    purpose: string;
  }) =>
    `${parts.study}. ${parts.cut}, visits to ${parts.day}, hash ${parts.cutHash}. ${parts.specification}, ${parts.purpose}. ${parts.fit}: ${counted(parts.subjects, 'subject', 'subjects')}, ${counted(parts.readings, 'reading', 'readings')}. ${parts.errors}. Engine ${parts.engine}, seed ${parts.seed}.`,
} as const;

export const recordsProblems: ProblemSentences = {
  record_content_differs:
    'The record does not hold the content that was to be signed. Load the page again and read it before you sign.',
  record_signed_already: 'You signed this record with this meaning before.',
  record_not_run_by_you:
    'This analysis was run by {name}. Sign it as reviewed, or leave it to them.',
};

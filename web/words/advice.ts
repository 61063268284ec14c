/** Which fits suit, why, and what would speak against each; filled from the codes of the check. */
import { counted, formatCount, formatDf } from './numbers.ts';

type Params = Readonly<Record<string, string | number>>;
type Sentences = Readonly<Record<string, (params: Params) => string>>;

const count = (value: string | number | undefined) => Number(value ?? 0);
const df = (params: Params) => formatDf(count(params.df));

const fits: Sentences = {
  pooled: () => 'Pooled line with cluster-robust errors',
  pooled_no_repeats: () => 'Pooled line with robust errors',
  own_lines: () => 'Each subject’s own line',
  wild_bootstrap: () => 'Wild cluster bootstrap beside the pooled line',
  ordinary: () => 'Ordinary straight line',
};

const whys: Sentences = {
  pooled: ({ subjects, readings }) =>
    `It counts ${counted(count(subjects), 'subject', 'subjects')}, not ${formatCount(count(readings))} readings, and its errors hold whatever the kind of likeness within a subject.`,
  pooled_no_repeats: () =>
    'No subject repeats; its errors also hold when the spread of the readings changes with time.',
  own_lines: () => 'It shows how far slopes differ between subjects, which a single line hides.',
  wild_bootstrap: () => 'Few subjects carry much of the pooled line.',
  wild_bootstrap_few: (params) =>
    `The errors of the pooled line rest on ${df(params)} degrees of freedom only.`,
  wild_bootstrap_few_uneven: (params) =>
    `The errors of the pooled line rest on ${df(params)} degrees of freedom only, and few subjects carry much of it.`,
  ordinary: () => 'No subject repeats, so independence is taken from the design of the study.',
};

const objections: Sentences = {
  fixed_by_one: ({ fixing }) =>
    `Subject ${fixing} alone fixes part of the line: what depends on it has no valid error.`,
  no_df: () => 'No degrees of freedom are left for its errors.',
  exploratory: (params) =>
    `Its errors rest on ${df(params)} degrees of freedom only: call it exploratory, and put no p value in a headline.`,
  few_df: (params) =>
    `Its errors rest on ${df(params)} degrees of freedom only: read the wild cluster bootstrap beside it.`,
  tied_subjects: () => 'Subjects are themselves tied together, by family, room or site.',
  lines_left_out: ({ without }) =>
    `${counted(count(without), 'subject has', 'subjects have')} too few readings for a line, and would be left out of the mean slope.`,
  short_lines: () => 'Lines of few readings are mistaken for real differences between subjects.',
  five_or_fewer: () =>
    'There are five subjects or fewer, where it can hardly reach a small p value.',
  tied_or_unequal: () =>
    'Subjects are themselves tied together, or the spread of the readings changes with time.',
};

type Advice = {
  fit: string;
  why: string;
  unless: string;
  codes?: { fit: string; why: string; unless: string };
  params?: Params;
};

/** The three sentences of one piece of advice; a code without words here keeps the engine’s own. */
export function adviceWords(advice: Advice): { fit: string; why: string; unless: string } {
  const { codes, params = {} } = advice;
  if (!codes) return advice;
  return {
    fit: fits[codes.fit]?.(params) ?? advice.fit,
    why: whys[codes.why]?.(params) ?? advice.why,
    unless: objections[codes.unless]?.(params) ?? advice.unless,
  };
}

/** Codes that have words, for the test that holds them against the engine’s. */
export const adviceCodes = {
  fit: Object.keys(fits),
  why: Object.keys(whys),
  unless: Object.keys(objections),
};

/** Why a subject has no line of its own. */
const notFitted = {
  one_reading: 'one reading',
  one_time: 'all readings at one time',
} as const;

export const notFittedCodes = Object.keys(notFitted);

export function notFittedReason(line: { code?: keyof typeof notFitted; reason: string }): string {
  return line.code ? notFitted[line.code] : line.reason;
}

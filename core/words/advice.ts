import { counted, named, rounded, whole } from './numbers.ts';

/** One fit that suits, why, and what would speak against it. */
export interface AdviceText {
  readonly fit: string;
  readonly why: string;
  readonly unless: string;
  /** The same three as codes with what fills them, for readers that have words of their own. */
  readonly codes: { readonly fit: FitCode; readonly why: WhyCode; readonly unless: UnlessCode };
  readonly params: Readonly<Record<string, string | number>>;
}

export type FitCode = 'pooled' | 'pooled_no_repeats' | 'own_lines' | 'wild_bootstrap' | 'ordinary';
export type WhyCode = FitCode | 'wild_bootstrap_few' | 'wild_bootstrap_few_uneven';
export type UnlessCode =
  | 'fixed_by_one'
  | 'no_df'
  | 'exploratory'
  | 'few_df'
  | 'tied_subjects'
  | 'lines_left_out'
  | 'short_lines'
  | 'five_or_fewer'
  | 'tied_or_unequal';

/** What advice is given on. */
export interface AdviceFacts {
  readonly subjects: number;
  readonly readings: number;
  readonly subjectsWithRepeats: number;
  /** Subjects with a line of their own. */
  readonly ownLines: number;
  /** The smallest Satterthwaite df of the coefficients beside the intercept; null where none is left. */
  readonly df: number | null;
  /** Subjects that alone fix a direction of the model. */
  readonly fixing: readonly string[];
  /** Whether a few subjects carry much of the fit, by leverage or by number of readings. */
  readonly uneven: boolean;
}

/** Below this df no p value is put in a headline. */
export const EXPLORATORY_BELOW = 4;
/** Below this df the wild bootstrap is recommended. */
export const BOOTSTRAP_BELOW = 10;

function pooledUnless({ df, fixing }: AdviceFacts): { code: UnlessCode; text: string } {
  if (fixing.length > 0) {
    const text = `Subject ${named(fixing)} alone fixes part of the line: what depends on it has no valid error.`;
    return { code: 'fixed_by_one', text };
  }
  if (df === null) {
    return { code: 'no_df', text: 'No degrees of freedom are left for its errors.' };
  }
  if (df < EXPLORATORY_BELOW) {
    const text = `Its errors rest on ${rounded(df)} degrees of freedom only: call it exploratory and put no p value in a headline.`;
    return { code: 'exploratory', text };
  }
  if (df < BOOTSTRAP_BELOW) {
    const text = `Its errors rest on ${rounded(df)} degrees of freedom only: read the wild cluster bootstrap beside it.`;
    return { code: 'few_df', text };
  }
  const text = 'Subjects are themselves tied together, by family, room or site.';
  return { code: 'tied_subjects', text };
}

/** Only what is known: a parameter is never null. */
function paramsOf({ subjects, readings, ownLines, df, fixing }: AdviceFacts) {
  return {
    subjects,
    readings,
    without: subjects - ownLines,
    ...(df === null ? {} : { df }),
    ...(fixing.length === 0 ? {} : { fixing: named(fixing) }),
  };
}

/** The pooled line with cluster-robust errors. */
export function pooledAdvice(facts: AdviceFacts): AdviceText {
  const unless = pooledUnless(facts);
  const params = paramsOf(facts);
  if (facts.subjectsWithRepeats === 0) {
    return {
      fit: 'Pooled line with robust errors',
      why: 'No subject repeats; its errors also hold when the spread of the readings changes with time.',
      unless: unless.text,
      codes: { fit: 'pooled_no_repeats', why: 'pooled_no_repeats', unless: unless.code },
      params,
    };
  }
  return {
    fit: 'Pooled line with cluster-robust errors',
    why: `It counts ${counted(facts.subjects, 'subject', 'subjects')}, not ${whole(facts.readings)} readings, and its errors hold whatever the kind of likeness within a subject.`,
    unless: unless.text,
    codes: { fit: 'pooled', why: 'pooled', unless: unless.code },
    params,
  };
}

/** Each subject's own line. */
export function ownLinesAdvice(facts: AdviceFacts): AdviceText {
  const without = facts.subjects - facts.ownLines;
  return {
    fit: "Each subject's own line",
    why: 'It shows how far slopes differ between subjects, which a single line hides.',
    unless:
      without > 0
        ? `${counted(without, 'subject has', 'subjects have')} too few readings for a line, and would be left out of the mean slope.`
        : 'Lines of few readings are mistaken for real differences between subjects.',
    codes: {
      fit: 'own_lines',
      why: 'own_lines',
      unless: without > 0 ? 'lines_left_out' : 'short_lines',
    },
    params: paramsOf(facts),
  };
}

/** The wild cluster bootstrap, where it is recommended. */
export function bootstrapAdvice(facts: AdviceFacts): AdviceText {
  const { df, uneven } = facts;
  const few = df !== null && df < BOOTSTRAP_BELOW;
  const why = few
    ? `The errors of the pooled line rest on ${rounded(df)} degrees of freedom only${uneven ? ', and few subjects carry much of it' : ''}.`
    : 'Few subjects carry much of the pooled line.';
  return {
    fit: 'Wild cluster bootstrap beside the pooled line',
    why,
    unless: 'There are five subjects or fewer, where it can hardly reach a small p value.',
    codes: {
      fit: 'wild_bootstrap',
      why: few ? (uneven ? 'wild_bootstrap_few_uneven' : 'wild_bootstrap_few') : 'wild_bootstrap',
      unless: 'five_or_fewer',
    },
    params: paramsOf(facts),
  };
}

/** An ordinary line, where no subject repeats. */
export function ordinaryAdvice(): AdviceText {
  return {
    fit: 'Ordinary straight line',
    why: 'No subject repeats, so independence is taken from the design of the study.',
    unless:
      'Subjects are themselves tied together, or the spread of the readings changes with time.',
    codes: { fit: 'ordinary', why: 'ordinary', unless: 'tied_or_unequal' },
    params: {},
  };
}

/** Said of an ordinary fit of repeated readings, on everything that comes from it. */
export const STAMP = 'independence not met';

/** Why ordinary results are locked. */
export function lockedText(readings: number, subjects: number): string {
  return `Ordinary straight-line results are locked: ${whole(readings)} readings of ${counted(subjects, 'subject', 'subjects')} are not independent. To see them, acknowledge this with a reason.`;
}

/** Why a subject has no line of its own. */
export const notFittedWords: Record<'one_reading' | 'one_time', string> = {
  one_reading: 'one reading',
  one_time: 'all readings at one time',
};

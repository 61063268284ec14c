import type { Verdict } from '../independence/verdict.ts';
import type { Structure } from '../table/structure.ts';
import { counted, rounded, whole } from './numbers.ts';

/** What the headline is made of. */
export interface HeadlineFacts {
  readonly structure: Structure;
  readonly verdict: Verdict;
  /** Null where it can't be given. */
  readonly icc: {
    readonly estimate: number;
    readonly lower: number;
    readonly upper: number;
  } | null;
  /** Whether the residuals have any variance to judge. */
  readonly judged: boolean;
}

/** Fewer subjects than this make a quiet test say little. */
const FEW_SUBJECTS = 30;

function structureSentence({ readings, subjects, subjectsWithRepeats }: Structure): string {
  if (subjectsWithRepeats === 0) {
    return `${whole(readings)} readings come from ${counted(subjects, 'subject', 'subjects')}, one each.`;
  }
  const all = subjectsWithRepeats === subjects;
  const who = all
    ? 'each has two or more'
    : `${whole(subjectsWithRepeats)} ${subjectsWithRepeats === 1 ? 'has' : 'have'} two or more`;
  return `${whole(readings)} readings come from ${counted(subjects, 'subject', 'subjects')}; ${who}. These are not ${whole(readings)} independent observations.`;
}

function iccPhrase(icc: HeadlineFacts['icc']): string {
  if (!icc) return '';
  return ` (intraclass correlation ${rounded(icc.estimate)}, approximate 95 % interval ${rounded(icc.lower)} to ${rounded(icc.upper)})`;
}

/** With a negative correlation the effective number of readings is above their number. */
function beyond(icc: HeadlineFacts['icc']): string {
  if (!icc || icc.estimate >= 0) return '';
  return ' The correlation is negative, so for a mean the readings count as more than their number.';
}

const NOT_JUDGED =
  'Whether that fades with time is not judged by a fit; see the correlation of successive residuals.';

const sentences: Record<Verdict, (facts: HeadlineFacts) => string> = {
  no_repeats: () =>
    "Independence can't be examined from repeats; it is taken from the design of the study.",
  negative: ({ icc }) =>
    `Readings of one subject differ more than readings of different subjects do${iccPhrase(icc)}.${beyond(icc)}`,
  repeats_none_detected: ({ icc, structure }) => {
    const few =
      structure.subjects < FEW_SUBJECTS
        ? ` With ${counted(structure.subjects, 'subject', 'subjects')} a quiet test has little power.`
        : '';
    return `No likeness within subjects was detected${iccPhrase(icc)}, which is no evidence that there is none.${beyond(icc)}${few} The design still ties the readings of a subject together.`;
  },
  exchangeable: ({ icc }) => `Readings of one subject are alike${iccPhrase(icc)}. ${NOT_JUDGED}`,
  serial: ({ icc }) =>
    `Readings of one subject are alike${iccPhrase(icc)}, less so further apart in time.`,
  exchangeable_and_serial: ({ icc }) =>
    `Readings of one subject are alike${iccPhrase(icc)}, and those close in time more so.`,
};

/** The headline of the independence check: the structure first, then what was found. */
export function headlineText(facts: HeadlineFacts): string {
  const found =
    facts.verdict === 'repeats_none_detected' && !facts.judged
      ? "The readings lie on the line, so whether those of one subject are alike can't be judged."
      : sentences[facts.verdict](facts);
  return `${structureSentence(facts.structure)} ${found}`;
}

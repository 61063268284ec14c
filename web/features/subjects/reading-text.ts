/** A reading in words: a value with its unit, a limit, or why there is none. */
import type { ReadingContent, SubjectDetail } from '../../../api/contracts/subjects.ts';
import { formatNumber } from '../../components/numbers.ts';
import { words } from '../../words/en.ts';

export type Measure = SubjectDetail['measures'][number];

export function readingText(content: ReadingContent, measure: Measure | undefined): string {
  if (content.notDone !== null) return words.subjects.notDone(content.notDone);
  if (content.limit)
    return `${content.limit.sign}\u2009${numberText(content.limit.value, measure)}`;
  if (content.choice !== null) {
    const choice = measure?.choices?.find(({ code }) => code === content.choice);
    return choice?.label ?? content.choice;
  }
  if (content.value === null) return words.common.none;
  if (measure?.nature === 'yes_no') return content.value === 1 ? words.common.yes : words.common.no;
  return numberText(content.value, measure);
}

/** What was read is shown as it was read: never with fewer decimals than it has. */
function numberText(value: number, measure: Measure | undefined): string {
  const own = (String(value).split('.')[1] ?? '').length;
  return formatNumber(value, Math.max(measure?.decimals ?? 0, Math.min(own, 10)));
}

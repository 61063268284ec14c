import type { ReadingView } from '../../../api/contracts/subjects.ts';
import { words } from '../../words/en.ts';
import { type Measure, readingText } from './reading-text.ts';

const text = words.subjects;

/** One reading with what has to be known about it: never a value without its doubts. */
export function ReadingCell({ reading, measure }: { reading: ReadingView; measure: Measure }) {
  const revisions = reading.revisions.length;
  return (
    <span className="block">
      <span className={reading.notDone === null ? 'figure' : 'text-faded'}>
        {readingText(reading, measure)}
      </span>
      {reading.replicate > 1 ? (
        <span className="text-13 text-faded"> {text.replicate(reading.replicate)}</span>
      ) : null}
      {reading.implausible ? (
        <span className="block text-13 text-stop">{text.implausible}</span>
      ) : null}
      {reading.explanation ? (
        <span className="block text-13 text-faded">{text.explanation(reading.explanation)}</span>
      ) : null}
      {revisions > 0 ? (
        <details className="text-13">
          <summary className="cursor-pointer text-kelp">{text.showCorrections(revisions)}</summary>
          <ul>
            {reading.revisions.map((revision) => (
              <li key={revision.at}>
                {text.correction(
                  readingText(revision.old, measure),
                  readingText(revision.new, measure),
                  revision.reasonText
                    ? `${revision.reason} (${revision.reasonText})`
                    : revision.reason,
                  revision.by,
                )}
              </li>
            ))}
          </ul>
        </details>
      ) : null}
    </span>
  );
}

import { ProgressBar } from 'react-aria-components';
import { words } from '../words/en.ts';
import { Button } from './button.tsx';

type ProgressProps = {
  /** What is being done, in words. */
  label: string;
  done: number;
  /** null or 0 while nothing is known yet. */
  total: number | null;
  cancel?: () => void;
};

/** Real progress of long work: rows read, draws done. */
export function Progress({ label, done, total, cancel }: ProgressProps) {
  const known = total !== null && total > 0;
  const text = known ? words.progress.done(done, total) : words.progress.waiting;
  return (
    <div className="max-w-text">
      <ProgressBar
        aria-label={label}
        value={known ? done : undefined}
        maxValue={known ? total : 1}
        isIndeterminate={!known}
        valueLabel={text}
      >
        <div className="flex justify-between gap-4">
          <span>{label}</span>
          <span className="figure">{text}</span>
        </div>
        <div className="mt-1 h-2 border border-edge">
          <div
            className="h-full bg-kelp"
            style={{ width: known ? `${Math.min(100, (100 * done) / total)}%` : '0%' }}
          />
        </div>
      </ProgressBar>
      <p className="mt-1 text-13 text-faded">{words.progress.keepsRunning}</p>
      {cancel ? (
        <Button className="mt-2" onPress={cancel}>
          {words.progress.cancel}
        </Button>
      ) : null}
    </div>
  );
}

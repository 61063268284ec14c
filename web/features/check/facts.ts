/** Small facts of a check that several of its parts need. */
import type { CheckView } from '../../../api/contracts/analysis.ts';

/** Whether dependence was found and so may show in its colour. */
export function isTethered({ independence }: CheckView): boolean {
  const { verdict } = independence;
  return (
    verdict === 'exchangeable' || verdict === 'serial' || verdict === 'exchangeable_and_serial'
  );
}

export function fileNameOf(check: CheckView, what: string): string {
  return `cut-${check.cut.number}-${check.measure.shortName}-specification-${check.specification.number}-${what}`;
}

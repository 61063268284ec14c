/** What was asked of a cut, named by the hash of its one spelling. */
import { canonicalSha256 } from '../../analysis-threads/canonical-json.ts';
import type { SpecificationInput } from '../../contracts/analysis.ts';

/**
 * SHA-256 of the canonical JSON of cut, measure, axis, unit and group.
 *
 * The seed and the kind of fit are no part of it: looking at the same question twice is one
 * specification, and the check and the fit of one question must meet in the same hash.
 *
 * @param cutUid the opaque id of the cut
 */
export function specificationSha256(cutUid: string, input: SpecificationInput): string {
  return canonicalSha256({
    axis: input.axis,
    cut: cutUid,
    group: input.group,
    measure: input.measure,
    unit: input.unit,
  });
}

/** What was asked of a cut, named by the hash of its one spelling. */
import { createHash } from 'node:crypto';
import { canonicalJson } from '../../analysis-threads/canonical-json.ts';
import type { SpecificationInput } from '../../contracts/analysis.ts';

export function sha256Of(text: string): string {
  return createHash('sha256').update(text, 'utf8').digest('hex');
}

/**
 * SHA-256 of the canonical JSON of cut, measure, axis, unit and group.
 *
 * The seed and the kind of fit are no part of it: looking at the same question twice is one
 * specification, and the check and the fit of one question must meet in the same hash.
 *
 * @param cutUid the opaque id of the cut
 */
export function specificationSha256(cutUid: string, input: SpecificationInput): string {
  return sha256Of(specificationText(cutUid, input));
}

/** The canonical JSON that the hash is taken of. */
export function specificationText(cutUid: string, input: SpecificationInput): string {
  return canonicalJson({
    axis: input.axis,
    cut: cutUid,
    group: input.group,
    measure: input.measure,
    unit: input.unit,
  });
}

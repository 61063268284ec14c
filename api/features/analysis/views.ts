/** Stored rows to the shapes of the contracts. */
import type { z } from 'zod';
import type { acknowledgementSchema, specificationSchema } from '../../contracts/analysis.ts';
import type { StoredAcknowledgement, StoredSpecification } from './analysis-repository.ts';

export function specificationView(
  stored: StoredSpecification,
): z.infer<typeof specificationSchema> {
  return {
    measure: stored.measure,
    axis: stored.axis,
    unit: stored.unit,
    group: stored.group,
    sha256: stored.sha256,
    number: stored.number,
  };
}

export function acknowledgementView(
  stored: StoredAcknowledgement,
): z.infer<typeof acknowledgementSchema> {
  return { by: stored.by, at: stored.at.toISOString(), reason: stored.reason };
}

import { CodeKey } from './code-key.entity.ts';
import { SealedAllocation } from './sealed-allocation.entity.ts';

export { CodeKey, SealedAllocation };

/** Listed in the data source of the open role alone. */
export const sealedEntities = [SealedAllocation, CodeKey];

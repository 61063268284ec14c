/** Every line of the table. A noun adds its file here. */
import { accountRows } from './accounts.ts';
import { jobRows } from './jobs.ts';
import { memberRows } from './members.ts';
import type { MatrixRow } from './row.ts';
import { lastRows, sessionRows } from './session.ts';

export const matrix: MatrixRow[] = [
  ...sessionRows,
  ...accountRows,
  ...memberRows,
  ...jobRows,
  ...lastRows,
];

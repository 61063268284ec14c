/** A first look at a whole uploaded file, before anything of it is stored or shown. */
import { isMissing } from './cells.ts';
import { FileProblem } from './file-problem.ts';
import { type Delimiter, readHeader, rowsOf } from './rows-of.ts';

export type Inspection = {
  delimiter: Delimiter;
  rows: number;
  columns: { name: string; samples: string[] }[];
};

/**
 * @param path the uploaded file
 * @param secretNames names no column may consist of (arm names of a masked study), else empty
 * @throws FileProblem with the place and what is wrong
 */
export async function inspectFile(path: string, secretNames: string[]): Promise<Inspection> {
  const secrets = new Set(secretNames.map((name) => name.trim().toLowerCase()));
  let header: string[] | null = null;
  let delimiter: Delimiter = ',';
  let rows = 0;
  const samples: string[][] = [];
  const onlySecrets: boolean[] = [];
  const filled: boolean[] = [];
  const named: boolean[] = [];
  for await (const row of rowsOf(path, null)) {
    if (header === null) {
      header = readHeader(row);
      delimiter = row.delimiter;
      for (const name of header) {
        samples.push([]);
        onlySecrets.push(true);
        filled.push(false);
        // A column named for an arm tells by ones and noughts who is in it, so its values are not asked.
        named.push(secrets.has(name.toLowerCase()));
      }
      continue;
    }
    rows += 1;
    for (let index = 0; index < header.length; index += 1) {
      const cell = (row.cells[index] ?? '').trim();
      if (cell === '') continue;
      // A gap written as NA or a dot does not make a list of arms into something else.
      if (!isMissing(cell)) {
        filled[index] = true;
        if (!secrets.has(cell.toLowerCase())) onlySecrets[index] = false;
      }
      const kept = samples[index] ?? [];
      if (kept.length < 3 && !kept.includes(cell)) kept.push(cell.slice(0, 60));
    }
  }
  if (header === null) throw new FileProblem('file_empty');
  if (rows === 0) throw new FileProblem('file_header_only');
  const secret = header.findIndex(
    (_, index) => named[index] || (filled[index] && onlySecrets[index]),
  );
  if (secrets.size > 0 && secret >= 0) {
    throw new FileProblem('file_arm_names', { name: header[secret] ?? '' });
  }
  return {
    delimiter,
    rows,
    columns: header.map((name, index) => ({ name, samples: samples[index] ?? [] })),
  };
}

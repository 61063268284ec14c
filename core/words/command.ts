/** English of what a long CSV can do wrong: what is wrong, then the mend. The place is said before it. */
export const csvWords = {
  empty: () => 'The file is empty. Give a header line and one line a reading.',
  binary: () => 'The file holds a NUL byte, so it is binary or UTF-16. Save it as CSV in UTF-8.',
  not_utf8: () => 'The text is not UTF-8. Save the file as CSV in UTF-8.',
  no_rows: () => 'There is no data row below the header. Give one line a reading.',
  missing_column: ({ names }: { names: readonly string[] }) =>
    `There is no such column. The header has ${names.map((name) => `"${name}"`).join(', ')}.`,
  repeated_column: () => 'The column stands more than once in the header. Rename one of them.',
  open_quote: () => 'A quote is opened and not closed. Close it, or double a quote that is meant.',
  stray_quote: () => 'A quote stands inside a quoted field. Double a quote that is meant.',
  ragged: ({ fields, header }: { fields: number; header: number }) =>
    `The line has ${fields} ${fields === 1 ? 'field' : 'fields'}, the header ${header}. Give every line as many fields as the header.`,
  not_a_number: ({ text }: { text: string }) =>
    `"${shortened(text)}" is not a number. Write a number, or leave the cell empty.`,
  infinite: ({ text }: { text: string }) =>
    `"${shortened(text)}" is infinite. Write a finite number, or leave the cell empty.`,
  overflow: ({ text }: { text: string }) =>
    `"${shortened(text)}" is too large to hold. Write a smaller number, or use another unit.`,
} as const;

export type CsvProblem = keyof typeof csvWords;
export type CsvParameters<C extends CsvProblem> = Parameters<(typeof csvWords)[C]>[0];

function shortened(text: string): string {
  const oneLine = text.replaceAll(/\s+/g, ' ').trim();
  return oneLine.length > 40 ? `${oneLine.slice(0, 40)}…` : oneLine;
}

/** English of bad use of the headless command; each is one line. */
export const commandWords = {
  help: () =>
    [
      'analyse FILE.csv --subject COLUMN --time COLUMN --response COLUMN [options]',
      '',
      'Prints the analysis of a long CSV as one JSON document, tetherline-analysis/1.',
      '',
      '  --group COLUMN        time by group; the reference is the first level in plain order',
      '  --seed NUMBER         seed of every random procedure; 1 when left out',
      '  --draws NUMBER        draws of the wild bootstrap and the permutations; 1999 when left out',
      '  --acknowledge REASON  opens the ordinary straight line where subjects repeat',
      '  --only PARTS          check, ols, lines, cr, wild, lmm, gee, within, assumptions; comma-separated',
      '  --timings             milliseconds by part, as the last line on standard error',
      '  --out FILE            writes the result there',
      '',
    ].join('\n'),
  usage: () =>
    'Give one CSV file: analyse FILE.csv --subject COLUMN --time COLUMN --response COLUMN.',
  missingOption: (name: string) => `--${name} is missing. Name the column of the file.`,
  unknownOption: (name: string) =>
    `--${name} is not an option. The options are --subject, --time, --response, --group, --seed, --draws, --acknowledge, --only, --timings, --out.`,
  optionWithoutValue: (name: string) => `--${name} needs a value after it.`,
  optionTwice: (name: string) => `--${name} is given twice. Give it once.`,
  notWhole: (name: string, value: string) => `--${name} "${value}" is not a whole number.`,
  notFound: () => 'There is no such file. Check the path.',
  isFolder: () => 'This is a folder. Give a CSV file.',
  unreadable: (why: string) => `The file can't be read (${why}). Check its permissions.`,
  unwritable: (why: string) =>
    `The result can't be written (${why}). Give --out a path that can be written.`,
  bug: (message: string) => `analyse: internal error: ${message}`,
} as const;

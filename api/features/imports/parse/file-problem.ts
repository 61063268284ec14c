/**
 * What is wrong with a whole file. Rows have reasons of their own; a file problem means that the rows
 * can't be told apart, so nothing of the file is read.
 */
export const fileProblemCodes = [
  'file_empty',
  'file_header_only',
  'file_workbook',
  'file_utf16',
  'file_nul_byte',
  'file_not_utf8',
  'file_line_too_long',
  'file_open_quote',
  'file_one_column',
  'file_header_blank',
  'file_header_repeated',
  'file_too_many_columns',
  'file_arm_names',
] as const;

export type FileProblemCode = (typeof fileProblemCodes)[number];
export type Params = Record<string, string | number>;

export class FileProblem extends Error {
  readonly code: FileProblemCode;
  readonly params: Params;

  constructor(code: FileProblemCode, params: Params = {}) {
    super(code);
    this.name = 'FileProblem';
    this.code = code;
    this.params = params;
  }
}

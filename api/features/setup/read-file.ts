import { type SetupFile, setupFileSchema } from '../../contracts/setup.ts';
import { Problem, type ProblemEntry } from '../../http/problems.ts';
import { sentenceOfIssue } from '../../words/invalid.ts';

/** @throws Problem `setup_file_invalid` with the place and the mend of every fault */
export function readSetupFile(text: string): SetupFile {
  let content: unknown;
  try {
    content = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    throw invalid([{ path: '', message: `This is not readable JSON: ${message}` }]);
  }
  const read = setupFileSchema.safeParse(content, { error: sentenceOfIssue });
  if (!read.success) {
    throw invalid(
      read.error.issues.map((issue) => ({
        path: issue.path.map(String).join('.'),
        message: issue.message,
      })),
    );
  }
  return read.data;
}

function invalid(errors: ProblemEntry[]): Problem {
  return new Problem('setup_file_invalid', {}, { errors });
}

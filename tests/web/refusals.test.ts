/** A refusal of the server is said in the words of the pages, also where it stands at one entry. */
import { describe, expect, it } from 'vitest';
import { Problem, problemDocument } from '../../api/http/problems.ts';
import { problemFrom } from '../../web/app/problem.ts';

const answered = (problem: Problem) =>
  problemFrom(
    new Response(JSON.stringify(problemDocument(problem, 'r-1')), {
      status: problem.status,
      headers: { 'Content-Type': 'application/problem+json' },
    }),
  );

describe('a refusal at one entry', () => {
  it('that repeats the sentence of the refusal is said in the page’s own', async () => {
    const errors = [{ path: 'mapping.value', message: '' }];
    const refused = await answered(
      new Problem('import_column_unknown', { column: 'wt' }, { errors }),
    );
    expect(refused.message).toBe('The file has no column “wt”. Choose one of its columns.');
    expect(refused.errors).toEqual([{ path: 'mapping.value', message: refused.message }]);
  });

  it('that says something of its own keeps it', async () => {
    const errors = [{ path: 'name', message: 'Write at least 1 character.' }];
    const refused = await answered(new Problem('invalid_request', {}, { errors }));
    expect(refused.errors).toEqual(errors);
  });
});

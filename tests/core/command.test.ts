import { createHash } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { command, type Outcome, scratch } from './support/command.ts';
import { differences } from './support/differences.ts';
import { pooledOf, type Result } from './support/engine.ts';
import { holes } from './support/no-holes.ts';
import { referenceAnalysis, referencePath } from './support/reference.ts';

const files = scratch();
afterAll(() => files.clear());

const HAND =
  'id,x,y\n1,0,10\n1,1,12\n1,2,13\n2,0,8\n2,2,11\n3,0,15\n3,1,15\n3,2,17\n3,3,20\n4,1,9\n4,3,12\n5,2,14\n';
const COLUMNS = ['--subject', 'id', '--time', 'x', '--response', 'y'];
const latin1 = (text: string): Uint8Array => Buffer.from(text, 'latin1');

const answerOf = (outcome: Outcome): Result => {
  expect(outcome.stderr).not.toMatch(/\bat .*:\d+|Error:/);
  expect(outcome.code).toBe(0);
  const result = JSON.parse(outcome.stdout) as Result;
  expect(holes(result)).toEqual([]);
  return result;
};

describe('bad input: exit 2, nothing on standard output, one line with the place and the mend', () => {
  const rows = (change: (lines: string[]) => string[]): string =>
    change(HAND.trimEnd().split('\n')).join('\n');
  test.concurrent.each<[string, string | Uint8Array, RegExp]>([
    ['empty.csv', '', /empty|no (data )?row/i],
    ['blank.csv', '\n\n  \n', /empty|no (data )?row|header|column/i],
    ['header-only.csv', 'id,x,y\n', /no (data )?row/i],
    [
      'binary.csv',
      Uint8Array.from([
        0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13, 255, 254, 0, 1,
      ]),
      /binary|text|NUL/i,
    ],
    [
      'open-quote.csv',
      rows((l) => l.map((line, k) => (k === 4 ? '"2,0,8' : line))),
      /quote.*|line 5/i,
    ],
    [
      'text-in-number.csv',
      rows((l) => l.map((line, k) => (k === 3 ? '1,2,high' : line))),
      /line 4\b.*\by\b|\by\b.*line 4\b/i,
    ],
    [
      'text-in-time.csv',
      rows((l) => l.map((line, k) => (k === 6 ? '3,week 1,15' : line))),
      /line 7\b.*\bx\b|\bx\b.*line 7\b/i,
    ],
    [
      'repeated-column.csv',
      'id,x,y,y\n1,0,10,1\n1,1,12,1\n2,0,8,1\n2,2,11,1\n',
      /\by\b.*(twice|repeat|more than once|two|2 )|(twice|repeat|more than once|two|2 ).*\by\b/i,
    ],
    ['missing-column.csv', HAND.replace('id,x,y', 'id,x,z'), /\by\b/],
    ['latin-1.csv', latin1(HAND.replace('\n1,0,10', '\nS\u00f8ren,0,10')), /UTF-8/i],
    ['nul.csv', HAND.replace('8\n', '8\u0000\n'), /NUL|binary|line 5/i],
    ['infinite.csv', HAND.replace(',20\n', ',Infinity\n'), /line 10\b/],
    ['overflow.csv', HAND.replace(',20\n', ',1e400\n'), /line 10\b/],
    ['huge.csv', HAND.replace(',20\n', ',1e308\n'), /line 10\b/],
    ['ragged.csv', rows((l) => l.map((line, k) => (k === 5 ? `${line},7` : line))), /line 6\b/],
    ['short-row.csv', rows((l) => l.map((line, k) => (k === 5 ? '2,2' : line))), /line 6\b/],
    ['pipes.csv', HAND.replaceAll(',', '|'), /\bid\b/],
    ['utf-16.csv', Buffer.from(`\uFEFF${HAND}`, 'utf16le'), /UTF-(8|16)/],
    ['decimal-comma.csv', HAND.replace('1,1,12', '1,1,"12,5"'), /line 3\b.*\by\b/],
    ['hexadecimal.csv', HAND.replace('1,1,12', '1,1,0x10'), /line 3\b.*\by\b/],
    ['formula.csv', HAND.replace('1,1,12', '1,1,=3+4'), /line 3\b.*\by\b/],
    ['one-subject.csv', 'id,x,y\n1,0,10\n1,1,12\n1,2,13\n', /subject/i],
    ['one-time.csv', 'id,x,y\n1,5,10\n1,5,12\n2,5,13\n2,5,3\n', /time|\bx\b/i],
    ['too-few.csv', 'id,x,y\n1,0,10\n2,5,12\n', /reading/i],
    [
      'all-missing.csv',
      'id,x,y\n1,0,\n1,1,NA\n2,0,.\n2,1,null\n',
      /missing|complete|no (usable )?(row|reading)/i,
    ],
  ])('%s', async (name, content, place) => {
    const path = files.file(name, content);
    const { code, stdout, stderr } = await command(path, ...COLUMNS);
    expect(stdout).toBe('');
    expect(stderr.trimEnd().split('\n')).toHaveLength(1);
    expect(stderr).toContain(name);
    expect(stderr).toMatch(place);
    expect(stderr).not.toMatch(/\bat .*\.ts:\d+|Error:|undefined|\[object/);
    // Place and mend are more than a few words.
    expect(stderr.trim().length).toBeGreaterThan(name.length + 30);
    expect(code).toBe(2);
  });

  test.concurrent('a group of one level, and a subject with two', async () => {
    const withGroup = (group: (line: string, k: number) => string): string =>
      HAND.trimEnd()
        .split('\n')
        .map((line, k) => (k === 0 ? `${line},arm` : `${line},${group(line, k)}`))
        .join('\n');
    const one = await command(
      files.file(
        'one-level.csv',
        withGroup(() => 'a'),
      ),
      ...COLUMNS,
      '--group',
      'arm',
    );
    expect(one.code).toBe(2);
    expect(one.stderr).toMatch(/one-level\.csv.*\ba\b/);
    const two = await command(
      files.file(
        'two-levels.csv',
        withGroup((line, k) => (line.startsWith('1') && k === 2 ? 'b' : line < '3' ? 'a' : 'b')),
      ),
      ...COLUMNS,
      '--group',
      'arm',
    );
    expect(two.code).toBe(2);
    expect(two.stderr).toMatch(/line 3\b/);
    expect(two.stderr.trimEnd().split('\n')).toHaveLength(1);
  });
});

describe('bad use: exit 2 and one line', () => {
  const path = files.file('use.csv', HAND);
  test.concurrent.each<[string, string[], RegExp]>([
    ['no file', [], /file/i],
    ['a file that is not there', [join(files.folder, 'nowhere.csv'), ...COLUMNS], /nowhere\.csv/],
    ['a folder', [files.folder, ...COLUMNS], /folder|directory|file/i],
    ['no response named', [path, '--subject', 'id', '--time', 'x'], /--response/],
    ['an unknown option', [path, ...COLUMNS, '--frobnicate'], /--frobnicate/],
    ['an unknown part', [path, ...COLUMNS, '--only', 'check,nonsense'], /nonsense/],
    ['a seed that is no number', [path, ...COLUMNS, '--seed', 'abc'], /--seed|seed/],
    ['no draws', [path, ...COLUMNS, '--draws', '0'], /draws/],
  ])('%s', async (_, args, words) => {
    const { code, stdout, stderr } = await command(...args);
    expect(code).toBe(2);
    expect(stdout).toBe('');
    expect(stderr.trimEnd().split('\n')).toHaveLength(1);
    expect(stderr).toMatch(words);
  });
});

describe('good input in its many spellings', () => {
  let plain: Result;
  beforeAll(async () => {
    plain = answerOf(await command(files.file('plain.csv', HAND), ...COLUMNS, '--draws', '99'));
  });

  test.concurrent('the numbers are those of the reference', async () => {
    const want = referenceAnalysis('hand-sized', 'twelve readings');
    expect(differences(plain.pooled, want.pooled, 1e-6)).toEqual([]);
    expect(differences(plain.structure, want.structure, 0)).toEqual([]);
    expect(plain.format).toBe('tetherline-analysis/1');
    expect(plain.seed).toBe(1);
    expect(plain.input).toMatchObject({ rows: 12, used: 12, dropped: [] });
    expect(plain.input.sha256).toBe(createHash('sha256').update(HAND).digest('hex'));
  });

  const semicolons = HAND.replaceAll(',', ';').replaceAll(/;(\d+)\n/g, ';$1,0\n');
  test.concurrent.each<[string, string]>([
    ['bom.csv', `\uFEFF${HAND}`],
    ['crlf.csv', HAND.replaceAll('\n', '\r\n')],
    ['no-last-newline.csv', HAND.trimEnd()],
    ['blank-lines.csv', HAND.replace('\n3,0', '\n\n\n3,0')],
    ['tabs.csv', HAND.replaceAll(',', '\t')],
    ['semicolons.csv', semicolons],
    ['quoted.csv', HAND.replaceAll(/^(\d)/gm, '"$1"').replace('id,', '"id",')],
    [
      'more-columns.csv',
      HAND.replaceAll('\n', ',"free, text"\n').replace('y,"free, text"', 'y,note'),
    ],
  ])('%s', async (name, content) => {
    const result = answerOf(await command(files.file(name, content), ...COLUMNS, '--draws', '99'));
    expect(result.pooled?.coefficients).toEqual(plain.pooled?.coefficients);
    expect(result.independence).toEqual(plain.independence);
    expect(result.per_subject).toEqual(plain.per_subject);
  });

  test.concurrent('decimal comma with semicolons reads fractions', async () => {
    const fractions = semicolons.replaceAll(',0\n', ',5\n');
    const result = answerOf(
      await command(files.file('fractions.csv', fractions), ...COLUMNS, '--draws', '99'),
    );
    expect(pooledOf(result, 'time').estimate).toBeCloseTo(pooledOf(plain, 'time').estimate, 12);
    expect(pooledOf(result, 'intercept').estimate).toBeCloseTo(
      pooledOf(plain, 'intercept').estimate + 0.5,
      12,
    );
  });

  test.concurrent('missing tokens are dropped by line, and 1 and 01 are two subjects', async () => {
    const content = `${HAND}6,1,\n6,NA,3\n,1,3\n6,2,N/A\n6,2,NaN\n6,2,null\n6,2,.\n01,1,11\n`;
    const result = answerOf(
      await command(files.file('missing.csv', content), ...COLUMNS, '--draws', '99'),
    );
    expect(result.input).toMatchObject({ rows: 20, used: 13 });
    expect(result.input.dropped.map((d) => d.line)).toEqual([14, 15, 16, 17, 18, 19, 20]);
    expect(result.structure.subjects).toBe(6);
  });
});

describe('the lock', () => {
  const path = files.file('locked.csv', HAND);

  test.concurrent('without a reason no ordinary result leaves the command', async () => {
    const { stdout } = await command(path, ...COLUMNS, '--draws', '99');
    const result = JSON.parse(stdout) as Result;
    expect(result.ols).toBeNull();
    expect(result.ols_locked).toMatch(/acknowledge/i);
    // The ordinary error of the slope is .8614679: it and its p stand nowhere in the text.
    expect(stdout).not.toContain('0.86146');
    expect(stdout).not.toContain('1.51268');
  });

  test.concurrent('with a reason it does', async () => {
    const result = answerOf(
      await command(path, ...COLUMNS, '--draws', '99', '--acknowledge', 'for comparison only'),
    );
    expect(result.ols?.coefficients.time?.se).toBeCloseTo(0.8614679, 7);
    expect(result.ols_locked).toBeNull();
  });

  test.concurrent('an empty reason is no reason', async () => {
    const { code, stdout } = await command(
      path,
      ...COLUMNS,
      '--draws',
      '99',
      '--acknowledge',
      '  ',
    );
    expect(code === 2 || (JSON.parse(stdout) as Result).ols === null).toBe(true);
  });
});

describe('running it', () => {
  const sleep = fileURLToPath(referencePath('sleepstudy', 'unbalanced.csv'));
  const columns = ['--subject', 'Subject', '--time', 'Days', '--response', 'Reaction'];

  test.concurrent('the same bytes twice, to standard output and to a file', async () => {
    const first = await command(sleep, ...columns, '--seed', '11');
    const out = join(files.folder, 'result.json');
    const second = await command(sleep, ...columns, '--seed', '11', '--out', out);
    expect(first.code).toBe(0);
    expect(second).toMatchObject({ code: 0, stdout: '' });
    expect(readFileSync(out, 'utf8').trimEnd()).toBe(first.stdout.trimEnd());
    expect(first.stdout).not.toMatch(/\b20\d\d-\d\d-\d\d|\b\d\d:\d\d:\d\d/);
  });

  test.concurrent('bad input writes no file', async () => {
    const out = join(files.folder, 'never.json');
    const { code } = await command(files.file('none.csv', 'id,x,y\n'), ...COLUMNS, '--out', out);
    expect(code).toBe(2);
    expect(existsSync(out)).toBe(false);
  });

  test.concurrent('--timings adds one JSON line of milliseconds and changes no byte of the result', async () => {
    const bare = await command(sleep, ...columns);
    const timed = await command(sleep, ...columns, '--timings');
    expect(timed.stdout).toBe(bare.stdout);
    const last = JSON.parse(timed.stderr.trimEnd().split('\n').at(-1)!) as Record<string, number>;
    for (const part of [
      'read',
      'structure',
      'independence',
      'ols',
      'per_subject',
      'cr2',
      'wild_bootstrap',
      'permutation',
      'total',
    ]) {
      expect(last[part], part).toBeGreaterThanOrEqual(0);
    }
    expect(last.total!).toBeGreaterThanOrEqual(last.cr2!);
  });

  test.concurrent('--help names every option on standard output', async () => {
    const { code, stdout, stderr } = await command('--help');
    expect([code, stderr]).toEqual([0, '']);
    for (const option of [
      'subject',
      'time',
      'response',
      'group',
      'seed',
      'draws',
      'acknowledge',
      'only',
      'timings',
      'out',
    ]) {
      expect(stdout).toContain(`--${option} `);
    }
  });

  test.concurrent('--only leaves the others null with a reason', async () => {
    const result = answerOf(await command(sleep, ...columns, '--only', 'cr'));
    expect(pooledOf(result, 'time').se_cr2).toBeCloseTo(1.7293040004895281, 8);
    expect(result.pooled?.wild_bootstrap).toBeNull();
    expect(result.independence).toBeNull();
    expect(result.per_subject).toBeNull();
  });

  test.concurrent('--group compares slopes', async () => {
    const path = fileURLToPath(referencePath('dietox', 'data.csv'));
    const args = [
      '--subject',
      'pig',
      '--time',
      'week',
      '--response',
      'weight',
      '--group',
      'vitamin',
    ];
    const result = answerOf(await command(path, ...args, '--only', 'cr'));
    const want = referenceAnalysis('dietox', 'by vitamin');
    expect(result.group_levels).toEqual(['Evit000', 'Evit100', 'Evit200']);
    expect(differences(result.pooled, want.pooled, 1e-6)).toEqual([]);
  });
});

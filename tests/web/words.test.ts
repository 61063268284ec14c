/** The catalogue answers for every code of the server, in our own voice. */
import { describe, expect, it } from 'vitest';
import { problemCodes, problemTable } from '../../api/http/problems.ts';
import { problems, words } from '../../web/words/en.ts';
import { fillSentence } from '../../web/words/problems.ts';

function placesOf(sentence: string): string[] {
  return [...sentence.matchAll(/\{(\w+)\}/g)].flatMap(([, name]) => name ?? []);
}

/** Every string of the catalogue with the way to it; sentences made from parameters are left to types. */
function stringsOf(value: unknown, path: string): [string, string][] {
  if (typeof value === 'string') return [[path, value]];
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, each]) => stringsOf(each, `${path}.${key}`));
}

describe('problems', () => {
  it.each(problemCodes)('%s has a sentence', (code) => {
    expect(problems[code]).toBeDefined();
  });

  it.each(problemCodes)('%s fills every place of its sentence', (code) => {
    const sentence = problems[code];
    if (!sentence) throw new Error(`no sentence for ${code}`);
    const params = Object.fromEntries(
      placesOf(problemTable[code].detail).map((name) => [name, '7']),
    );
    const filled = fillSentence(sentence, params);
    expect(filled).not.toMatch(/\{\w+\}|undefined|NaN/);
    expect(filled.length).toBeGreaterThan(10);
  });
});

describe('words', () => {
  const strings = stringsOf(words, 'words');

  it('are there, and none is empty', () => {
    expect(strings.length).toBeGreaterThan(100);
    for (const [path, text] of strings) {
      // Three states of an interval have no words of their own, so a single space is a fault too.
      expect(text.trim(), path).not.toBe('');
    }
  });

  it.each(strings)('%s keeps to our voice', (_path, text) => {
    expect(text).not.toMatch(/\b(success|oops|significant|compliant|please)\b/i);
    expect(text).not.toMatch(/[A-Z]{6,}/);
    // A typewriter apostrophe between letters is a slip of the pen.
    expect(text).not.toMatch(/[a-z]'[a-z]/);
  });
});

/** Every piece of advice that the engine can give has words on the page, filled as the engine fills its own. */
import { describe, expect, it } from 'vitest';
import {
  bootstrapAdvice,
  notFittedWords as engineNotFitted,
  ordinaryAdvice,
  ownLinesAdvice,
  pooledAdvice,
} from '../../core/words/advice.ts';
import { adviceCodes, adviceWords, notFittedCodes } from '../../web/words/advice.ts';

const facts = {
  subjects: 18,
  readings: 180,
  subjectsWithRepeats: 18,
  ownLines: 18,
  df: 17,
  fixing: [] as string[],
  uneven: false,
};
const given = [
  pooledAdvice(facts),
  pooledAdvice({ ...facts, subjectsWithRepeats: 0 }),
  pooledAdvice({ ...facts, fixing: ['S01'] }),
  pooledAdvice({ ...facts, df: null }),
  pooledAdvice({ ...facts, df: 3.2 }),
  pooledAdvice({ ...facts, df: 8.1 }),
  ownLinesAdvice(facts),
  ownLinesAdvice({ ...facts, ownLines: 15 }),
  bootstrapAdvice({ ...facts, uneven: true }),
  bootstrapAdvice({ ...facts, df: 8.1 }),
  bootstrapAdvice({ ...facts, df: 8.1, uneven: true }),
  ordinaryAdvice(),
];

describe('advice in words', () => {
  it('covers every code, and no words stand without a code', () => {
    for (const part of ['fit', 'why', 'unless'] as const) {
      const used = [...new Set(given.map(({ codes }) => codes[part]))].sort();
      expect(used).toEqual([...adviceCodes[part]].sort());
    }
    expect(notFittedCodes).toEqual(Object.keys(engineNotFitted));
  });

  it('keeps the English of a record that holds nothing else', () => {
    const { codes: _codes, params: _params, ...older } = pooledAdvice(facts);
    expect(adviceWords(older)).toEqual(older);
  });

  it('says the numbers of the engine', () => {
    expect(adviceWords(pooledAdvice(facts)).why).toContain('18 subjects, not 180 readings');
    expect(adviceWords(pooledAdvice({ ...facts, df: 3.2 })).unless).toContain('3.2 degrees');
    expect(adviceWords(pooledAdvice({ ...facts, fixing: ['S01'] })).unless).toContain('S01');
    expect(adviceWords(ownLinesAdvice({ ...facts, ownLines: 15 })).unless).toContain('3 subjects');
    for (const advice of given) {
      for (const sentence of Object.values(adviceWords(advice))) {
        expect(sentence).not.toMatch(/undefined|NaN|null|^$/);
      }
    }
  });
});

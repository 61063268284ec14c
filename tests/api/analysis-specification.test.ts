import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { canonicalJson } from '../../api/analysis-threads/canonical-json.ts';
import { specificationSha256 } from '../../api/features/analysis/specification.ts';

describe('canonical JSON', () => {
  it('has one spelling for equal values', () => {
    expect(canonicalJson({ b: [1, { d: null, c: 'é"' }], a: -0 })).toBe(
      '{"a":0,"b":[1,{"c":"é\\"","d":null}]}',
    );
    expect(canonicalJson({ a: undefined, b: true })).toBe('{"b":true}');
  });

  it('refuses what JSON cannot hold', () => {
    expect(() => canonicalJson({ a: Number.NaN })).toThrow(RangeError);
  });
});

describe('specification', () => {
  const input = { measure: 'y', axis: 'since_baseline', unit: 'days', group: false } as const;

  it('is the hash of cut, measure, axis, unit and group', () => {
    const text = '{"axis":"since_baseline","cut":"c1","group":false,"measure":"y","unit":"days"}';
    expect(specificationSha256('c1', input)).toBe(createHash('sha256').update(text).digest('hex'));
  });

  it('differs with each of the five', () => {
    const all = [
      specificationSha256('c1', input),
      specificationSha256('c2', input),
      specificationSha256('c1', { ...input, measure: 'z' }),
      specificationSha256('c1', { ...input, axis: 'planned_day' }),
      specificationSha256('c1', { ...input, unit: 'weeks' }),
      specificationSha256('c1', { ...input, group: true }),
    ];
    expect(new Set(all).size).toBe(6);
  });
});

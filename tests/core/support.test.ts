import { expect, test } from 'vitest';
import { differences } from './support/differences.ts';
import { holes } from './support/no-holes.ts';

// The two tools that the other tests lean on must themselves see what is wrong.

test('differences sees a wrong digit, a missing number, a null and a short list', () => {
  const want = { a: { b: [1, 2.5] }, p: 1e-17 };
  expect(differences({ a: { b: [1, 2.5] }, p: 1e-17, more: 1 }, want, 1e-9)).toEqual([]);
  expect(differences({ a: { b: [1, 2.5000001] }, p: 1e-17 }, want, 1e-9)).toHaveLength(1);
  expect(differences({ a: { b: [1, 2.5] }, p: 2e-17 }, want, 1e-6)).toHaveLength(1);
  expect(differences({ a: { b: [1] }, p: 1e-17 }, want, 1)).toHaveLength(1);
  expect(differences({ a: { b: [1, null] }, p: Number.NaN }, want, 1)).toHaveLength(2);
  expect(differences({ a: null, p: '1e-17' }, want, 1)).toHaveLength(2);
  expect(differences({ x: 0 }, { x: null }, 1)).toHaveLength(1);
});

test('holes sees NaN, Infinity, undefined, typed arrays and a null without its reason', () => {
  expect(holes({ a: 1, b: [{ c: null, c_reason: 'nothing repeats here' }] })).toEqual([]);
  expect(holes({ a: Number.NaN })).toHaveLength(1);
  expect(holes({ a: [1, Number.NEGATIVE_INFINITY] })).toHaveLength(1);
  expect(holes({ a: undefined })).toHaveLength(1);
  expect(holes({ a: Float64Array.of(1) })).toHaveLength(1);
  expect(holes({ a: { b: null } })).toHaveLength(1);
  expect(holes({ a: null, a_reason: '' })).toHaveLength(1);
  expect(holes({ a: 'the slope is NaN' })).toHaveLength(1);
});

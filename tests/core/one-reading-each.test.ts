import fc from 'fast-check';
import { expect, test } from 'vitest';
import { differences } from './support/differences.ts';
import { analyseRows, pooledOf, present, type Row } from './support/engine.ts';
import { holes } from './support/no-holes.ts';

// With one reading per subject the cluster-robust errors are those for unequal variances: CR0 is White's
// HC0 (Econometrica 48:817, 1980), CR2 is HC2 and CR3 is HC3 (MacKinnon & White 1985). Written out here
// for a line: w_i = (x_i - mean)/Sxx are the weights of the slope, h_i = 1/n + (x_i - mean)^2/Sxx.

interface Robust {
  slope: number;
  hc0: number;
  hc2: number;
  hc3: number;
}

function robustByHand(points: readonly (readonly [number, number])[]): Robust {
  const n = points.length;
  const mx = points.reduce((sum, [x]) => sum + x, 0) / n;
  const my = points.reduce((sum, [, y]) => sum + y, 0) / n;
  const sxx = points.reduce((sum, [x]) => sum + (x - mx) ** 2, 0);
  const slope = points.reduce((sum, [x, y]) => sum + (x - mx) * (y - my), 0) / sxx;
  const sum = (power: number): number =>
    Math.sqrt(
      points.reduce((total, [x, y]) => {
        const e = y - my - slope * (x - mx);
        const h = 1 / n + (x - mx) ** 2 / sxx;
        return total + (((x - mx) / sxx) * e) ** 2 / (1 - h) ** power;
      }, 0),
    );
  return { slope, hc0: sum(0), hc2: sum(1), hc3: sum(2) };
}

const points = fc
  .array(fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: -800, max: 800 })), {
    minLength: 5,
    maxLength: 25,
  })
  .map((list) => list.map(([x, y]) => [x / 4, y / 8] as const))
  // No point may hold the slope alone: at leverage 1 HC2 and HC3 do not exist.
  .filter((list) => {
    const counts = new Map<number, number>();
    for (const [x] of list) counts.set(x, (counts.get(x) ?? 0) + 1);
    return counts.size >= 3;
  })
  .filter((list) => robustByHand(list).hc0 > 1e-3);

test('CR0 = HC0, CR2 = HC2, CR3 = HC3, and what needs repeats is null with a reason', () => {
  fc.assert(
    fc.property(points, (list) => {
      const rows = list.map(([x, y], i): Row => [`one-${i}`, x, y]);
      const result = analyseRows(rows, { draws: 99 });
      const time = pooledOf(result, 'time');
      const want = robustByHand(list);
      expect(
        differences(
          { slope: time.estimate, hc0: time.se_cr0, hc2: time.se_cr2, hc3: time.se_cr3 },
          want,
          1e-9,
        ),
      ).toEqual([]);

      const i = present(result.independence, 'independence');
      expect(i.verdict).toBe('no_repeats');
      expect(i.warn).toBe(false);
      for (const block of [
        i.icc_residual,
        i.icc_response,
        i.anova,
        i.design_effect,
        i.effective_n,
        i.lr_test,
        i.permutation,
        i.serial,
        i.moulton,
        result.lmm,
        result.gee,
        result.within_between,
        present(result.pooled, 'pooled').wild_bootstrap,
      ]) {
        expect(block).toBeNull();
      }
      const own = present(result.per_subject, 'per_subject');
      expect(own.mean_slope).toBeNull();
      expect(own.lines).toEqual([]);
      expect(own.not_fitted).toHaveLength(list.length);
      // Given freely: nothing repeats, so nothing is locked.
      expect(result.ols_locked).toBeNull();
      const ols = present(result.ols?.coefficients.time, 'ols');
      expect(
        differences(
          present(i.se_ratio, 'se_ratio').time,
          present(time.se_cr2, 'cr2') / ols.se,
          1e-9,
        ),
      ).toEqual([]);
      expect(holes(result)).toEqual([]);
    }),
    { numRuns: 80, seed: 20261201 },
  );
});

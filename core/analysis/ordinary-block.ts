import { studentQuantile, studentTwoSided } from '../distributions/student-t.ts';
import { ordinaryError } from '../linear/fit-ols.ts';
import type { MeanModel } from './mean-model.ts';
import { nullable, orReason } from './nullable.ts';
import type { OrdinaryBlock, OrdinaryCoefficient } from './result.ts';

/** The ordinary straight-line fit: errors, t, p and limits on N − p df, which take every reading as independent. */
export function ordinaryBlock(model: MeanModel): OrdinaryBlock {
  const { fit } = model;
  const df = fit.n - fit.p;
  const reach = studentQuantile(0.975, df);
  const coefficients: Record<string, OrdinaryCoefficient> = {};
  model.directions.forEach((h, k) => {
    const estimate = fit.beta[k]!;
    const se = ordinaryError(fit, h);
    const t = se > 0 ? estimate / se : null;
    coefficients[fit.names[k]!] = {
      estimate,
      se,
      ...nullable('t', orReason(t, 'no_residual_variance')),
      df,
      ...nullable(
        'p',
        orReason(t === null ? null : studentTwoSided(t, df), 'no_residual_variance'),
      ),
      lower: estimate - reach * se,
      upper: estimate + reach * se,
    };
  });
  const rSquared = fit.tss > 0 ? 1 - fit.rss / fit.tss : null;
  return {
    coefficients,
    sigma: Math.sqrt(fit.sigmaSquared),
    ...nullable('r_squared', orReason(rSquared, 'constant_response')),
  };
}

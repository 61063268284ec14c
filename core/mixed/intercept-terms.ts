import type { OlsFit } from '../linear/fit-ols.ts';

/** What the random-intercept deviance needs of the readings, reduced once, subject by subject, in the basis Q. */
export interface InterceptTerms {
  readonly fit: OlsFit;
  /** G readings per subject: K_i. */
  readonly k: Float64Array;
  /** G × p: M_i = 1'Q_i. */
  readonly m: Float64Array;
  /** G: 1'e_i. */
  readonly e: Float64Array;
  /** log |det R| of X = QR on the user's scale. */
  readonly logDetR: number;
}

/** Gathers the terms; `start` holds the G + 1 offsets of the subjects. */
export function interceptTerms(fit: OlsFit, start: Int32Array): InterceptTerms {
  const { p, q, residuals } = fit;
  const count = start.length - 1;
  const k = new Float64Array(count);
  const m = new Float64Array(count * p);
  const e = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    const from = start[i]!;
    const to = start[i + 1]!;
    k[i] = to - from;
    for (let a = 0; a < p; a++) {
      const column = q[a]!;
      let sum = 0;
      for (let r = from; r < to; r++) sum += column[r]!;
      m[i * p + a] = sum;
    }
    let sum = 0;
    for (let r = from; r < to; r++) sum += residuals[r]!;
    e[i] = sum;
  }
  let logDetR = 0;
  for (let a = 0; a < p; a++) logDetR += Math.log(Math.abs(fit.r.get(a, a)));
  return { fit, k, m, e, logDetR };
}

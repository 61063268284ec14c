const GOLDEN = 0.5 * (3 - Math.sqrt(5));

/**
 * The minimum of a function of one variable inside [low, high] by Brent's method (1973, ch. 5): parabolas, with
 * golden sections where they fail. Ends when the bracket is within `tolerance` of the best point.
 */
export function brentMinimum(
  f: (x: number) => number,
  low: number,
  high: number,
  tolerance: number,
): { x: number; value: number } {
  let a = low;
  let b = high;
  let x = a + GOLDEN * (b - a);
  let w = x;
  let v = x;
  let fx = f(x);
  let fw = fx;
  let fv = fx;
  let d = 0;
  let e = 0;
  for (let step = 0; step < 200; step++) {
    const middle = 0.5 * (a + b);
    const reach = 1e-11 * Math.abs(x) + tolerance / 3;
    if (Math.abs(x - middle) <= 2 * reach - 0.5 * (b - a)) break;
    let golden = true;
    if (Math.abs(e) > reach) {
      const r = (x - w) * (fx - fv);
      let q = (x - v) * (fx - fw);
      let p = (x - v) * q - (x - w) * r;
      q = 2 * (q - r);
      if (q > 0) p = -p;
      else q = -q;
      const before = e;
      e = d;
      if (Math.abs(p) < Math.abs(0.5 * q * before) && p > q * (a - x) && p < q * (b - x)) {
        d = p / q;
        const u = x + d;
        if (u - a < 2 * reach || b - u < 2 * reach) d = x < middle ? reach : -reach;
        golden = false;
      }
    }
    if (golden) {
      e = x < middle ? b - x : a - x;
      d = GOLDEN * e;
    }
    const u = x + (Math.abs(d) >= reach ? d : d > 0 ? reach : -reach);
    const fu = f(u);
    if (fu <= fx) {
      if (u < x) b = x;
      else a = x;
      v = w;
      fv = fw;
      w = x;
      fw = fx;
      x = u;
      fx = fu;
    } else {
      if (u < x) a = u;
      else b = u;
      if (fu <= fw || w === x) {
        v = w;
        fv = fw;
        w = u;
        fw = fu;
      } else if (fu <= fv || v === x || v === w) {
        v = u;
        fv = fu;
      }
    }
  }
  return { x, value: fx };
}

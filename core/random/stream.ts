const TWO_POWER_32 = 4294967296;
const TWO_POWER_MINUS_32 = 1 / TWO_POWER_32;

/**
 * Random numbers without state outside: Doty-Humphrey's small fast counter generator (sfc32), started afresh for
 * each draw from (seed, procedure name, draw index). Asking for fewer draws, or spreading them over threads,
 * therefore never changes a draw.
 */
export class RandomStream {
  private a = 0;
  private b = 0;
  private c = 0;
  private counter = 1;
  private readonly nameHash: number;

  /**
   * @param seed any whole number below 2^53; both its halves count
   * @param procedure the name of the random procedure, so that two of them never share draws
   */
  constructor(
    private readonly seed: number,
    procedure: string,
  ) {
    this.nameHash = hashText(procedure);
    this.start(0);
  }

  /** Begins draw number `draw` (0, 1, 2, …). */
  start(draw: number): void {
    const low = this.seed >>> 0;
    const high = Math.floor(this.seed / 4294967296) >>> 0;
    this.a = mix(low ^ mix(high ^ 0x9e3779b9));
    this.b = this.nameHash;
    this.c = mix(draw ^ 0x85ebca6b);
    this.counter = 1;
    for (let k = 0; k < 15; k++) this.next();
  }

  /** A whole number uniform on 0 … 2^32 − 1. */
  next(): number {
    const value = (this.a + this.b + this.counter) | 0;
    this.counter = (this.counter + 1) | 0;
    this.a = this.b ^ (this.b >>> 9);
    this.b = (this.c + (this.c << 3)) | 0;
    this.c = (((this.c << 21) | (this.c >>> 11)) + value) | 0;
    return value >>> 0;
  }

  /** A whole number uniform on 0 … n − 1, 1 ≤ n ≤ 2^21, without bias (Lemire 2019, exact in doubles). */
  below(n: number): number {
    for (;;) {
      const product = this.next() * n;
      const whole = Math.floor(product * TWO_POWER_MINUS_32);
      const rest = product - whole * TWO_POWER_32;
      if (rest >= n || rest >= TWO_POWER_32 % n) return whole;
    }
  }

  /**
   * Puts the first `count` entries from `from` on into random order (Fisher and Yates). Up to 2^21 entries.
   *
   * The generator runs in local variables here: the permutation tests spend most of their time in this loop.
   */
  shuffle(values: Float64Array, from: number, count: number): void {
    let { a, b, c, counter } = this;
    for (let k = count - 1; k > 0; k--) {
      const n = k + 1;
      let whole = 0;
      for (;;) {
        const value = (a + b + counter) | 0;
        counter = (counter + 1) | 0;
        a = b ^ (b >>> 9);
        b = (c + (c << 3)) | 0;
        c = (((c << 21) | (c >>> 11)) + value) | 0;
        const product = (value >>> 0) * n;
        whole = Math.floor(product * TWO_POWER_MINUS_32);
        const rest = product - whole * TWO_POWER_32;
        if (rest >= n || rest >= TWO_POWER_32 % n) break;
      }
      const kept = values[from + k]!;
      values[from + k] = values[from + whole]!;
      values[from + whole] = kept;
    }
    this.a = a;
    this.b = b;
    this.c = c;
    this.counter = counter;
  }
}

/** A 32-bit finaliser (Stafford's variant of the murmur mixer): each input bit reaches each output bit. */
function mix(value: number): number {
  let h = value | 0;
  h = Math.imul(h ^ (h >>> 16), 0x7feb352d);
  h = Math.imul(h ^ (h >>> 15), 0x846ca68b);
  return (h ^ (h >>> 16)) >>> 0;
}

function hashText(text: string): number {
  let h = 0x811c9dc5;
  for (let k = 0; k < text.length; k++) h = Math.imul(h ^ text.charCodeAt(k), 0x01000193);
  return mix(h);
}

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

  /** A whole number uniform on 0 … n − 1, n ≤ 2^32, without bias (rejection). */
  below(n: number): number {
    const limit = 4294967296 - (4294967296 % n);
    let value = this.next();
    while (value >= limit) value = this.next();
    return value % n;
  }

  /** Puts the first `count` entries from `from` on into random order (Fisher and Yates). */
  shuffle(values: Float64Array | Int32Array, from: number, count: number): void {
    for (let k = count - 1; k > 0; k--) {
      const other = from + this.below(k + 1);
      const kept = values[from + k]!;
      values[from + k] = values[other]!;
      values[other] = kept;
    }
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

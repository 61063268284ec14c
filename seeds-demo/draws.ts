/** Draws for invented people, repeatable: the same name and index give the same numbers. */
import { RandomStream } from '../core/random/stream.ts';

const SEED = 20261;

export class Draws {
  private readonly stream: RandomStream;

  constructor(name: string, index: number) {
    this.stream = new RandomStream(SEED, name);
    this.stream.start(index);
  }

  /** Uniform between 0 and 1, neither included. */
  share(): number {
    return (this.stream.next() + 0.5) / 4294967296;
  }

  chance(probability: number): boolean {
    return this.share() < probability;
  }

  between(low: number, high: number): number {
    return low + Math.floor(this.share() * (high - low + 1));
  }

  /** Standard normal (Box and Muller 1958). */
  normal(): number {
    return Math.sqrt(-2 * Math.log(this.share())) * Math.cos(2 * Math.PI * this.share());
  }

  /** Poisson by multiplying uniforms; for small means only. */
  count(mean: number): number {
    const floor = Math.exp(-mean);
    let product = this.share();
    let count = 0;
    while (product > floor) {
      product *= this.share();
      count += 1;
    }
    return count;
  }

  pick<T>(from: readonly T[]): T {
    const picked = from[Math.floor(this.share() * from.length)];
    if (picked === undefined) throw new Error('nothing to pick from');
    return picked;
  }
}

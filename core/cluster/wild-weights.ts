import { RandomStream } from '../random/stream.ts';

export type WildWeights = 'rademacher_enumerated' | 'webb' | 'rademacher';

/** Webb's six points (2013): ±√½, ±1, ±√(3/2), variance one and enough distinct draws for few subjects. */
const WEBB_POINTS = [
  -Math.sqrt(1.5),
  -1,
  -Math.sqrt(0.5),
  Math.sqrt(0.5),
  1,
  Math.sqrt(1.5),
] as const;

/** Below this number of subjects random signs repeat themselves too much, and Webb's points are drawn. */
const WEBB_BELOW = 12;

/** Which weights serve G subjects and B draws: all sign vectors where they fit into B, else Webb's, else signs. */
export function chooseWeights(subjects: number, draws: number): WildWeights {
  if (2 ** subjects <= draws) return 'rademacher_enumerated';
  return subjects < WEBB_BELOW ? 'webb' : 'rademacher';
}

/** A source of weight vectors: `fill` writes vector number `draw` (0 … count − 1). */
export interface WeightSource {
  readonly kind: WildWeights;
  /** Vectors that are computed; with enumeration half of 2^G, as w and −w agree. */
  readonly count: number;
  /** Whether every squared weight is 1. */
  readonly signs: boolean;
  readonly fill: (draw: number, into: Float64Array) => void;
}

/** All 2^G sign vectors, the first sign fixed at +1; vector 0 is the identity. */
function enumerated(subjects: number): WeightSource {
  return {
    kind: 'rademacher_enumerated',
    signs: true,
    count: 2 ** (subjects - 1),
    fill: (draw, into) => {
      into[0] = 1;
      for (let i = 1; i < subjects; i++) into[i] = (draw >>> (i - 1)) & 1 ? -1 : 1;
    },
  };
}

function signs(seed: number, draws: number): WeightSource {
  const stream = new RandomStream(seed, 'wild bootstrap signs');
  return {
    kind: 'rademacher',
    signs: true,
    count: draws,
    fill: (draw, into) => {
      stream.start(draw);
      let bits = 0;
      for (let i = 0; i < into.length; i++) {
        if (i % 32 === 0) bits = stream.next();
        into[i] = bits & 1 ? 1 : -1;
        bits >>>= 1;
      }
    },
  };
}

/** Webb's weights, `draws` vectors from the seed. */
export function webbSource(seed: number, draws: number): WeightSource {
  const stream = new RandomStream(seed, 'wild bootstrap webb');
  return {
    kind: 'webb',
    signs: false,
    count: draws,
    fill: (draw, into) => {
      stream.start(draw);
      for (let i = 0; i < into.length; i++) into[i] = WEBB_POINTS[stream.below(6)]!;
    },
  };
}

/** The source that `chooseWeights` names. */
export function weightSource(subjects: number, draws: number, seed: number): WeightSource {
  const kind = chooseWeights(subjects, draws);
  if (kind === 'rademacher_enumerated') return enumerated(subjects);
  return kind === 'webb' ? webbSource(seed, draws) : signs(seed, draws);
}

import type { ValueTransformer } from 'typeorm';

/** For bigint columns that hold counts and sizes, not keys: a number as long as it is exact. */
export const wholeNumber: ValueTransformer = {
  to: (value: number | null | undefined) => value,
  from: (text: string | null) => {
    if (text === null) {
      return null;
    }
    const value = Number(text);
    if (!Number.isSafeInteger(value)) {
      throw new RangeError(`${text} is too large to be kept as a number`);
    }
    return value;
  },
};

/** The one source of time for rules and records; tests put a fixed one in its place. */
export type Clock = () => Date;

export const systemClock: Clock = () => new Date();

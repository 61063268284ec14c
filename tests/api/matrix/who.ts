/** Everybody a route is tried by. A stranger holds every compatible duty, in another study. */
export const everybody = [
  'owner',
  'coordinator',
  'monitor',
  'analyst',
  'unblinded statistician',
  'board member',
  'safety officer',
  'administrator',
  'stranger',
  'anonymous',
] as const;
export type Who = (typeof everybody)[number];

/**
 * Who may read and who may act on cuts; the analysis and its records follow the same two lists. The first
 * duty that a person holds is the one the trail names.
 */
export const READERS = ['analyst', 'owner'] as const;
export const ANALYSTS = ['analyst'] as const;

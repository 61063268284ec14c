/** Headings of the security log as a file. */
export const securityLogWords = {
  columns: ['number', 'at (UTC)', 'action', 'by', 'about', 'address fingerprint', 'reason', 'hash'],
  fileName: (day: string) => `security-log-${day}.csv`,
} as const;

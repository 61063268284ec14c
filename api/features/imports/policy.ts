/** Who may import: those who log readings, for subjects of their own sites. */
export const mayImport = { study: ['coordinator'] } as const;

/** Accounts and the security log belong to the administrator, who sees no study data in turn. */
export const mayManageAccounts = 'administrator' as const;

/** The three database roles that serve requests, beside the owner that migrates. */
export const DATABASE_ROLES = ['masked', 'board', 'open'] as const;
export type DatabaseRole = (typeof DATABASE_ROLES)[number];
export type ByDatabaseRole<T> = Record<DatabaseRole, T>;

export interface RoleSettings {
  /** Roles are named `<rolePrefix>_masked`, `_board` and `_open`. */
  rolePrefix: string;
  passwords: ByDatabaseRole<string>;
}

/** @throws RangeError where the prefix can't stand in a name without quotes */
export function roleName(rolePrefix: string, role: DatabaseRole): string {
  if (!/^[a-z][a-z0-9_]{0,39}$/.test(rolePrefix)) {
    throw new RangeError(
      `DB_ROLE_PREFIX is "${rolePrefix}": use 1 to 40 lower-case letters, digits and underscores, a letter first`,
    );
  }
  return `${rolePrefix}_${role}`;
}

/** The owner's address with user and password of each role in place of its own. */
export function roleUrls(ownerUrl: string, settings: RoleSettings): ByDatabaseRole<string> {
  const forRole = (role: DatabaseRole): string => {
    const url = new URL(ownerUrl);
    url.username = roleName(settings.rolePrefix, role);
    url.password = encodeURIComponent(settings.passwords[role]);
    return url.toString();
  };
  return { masked: forRole('masked'), board: forRole('board'), open: forRole('open') };
}

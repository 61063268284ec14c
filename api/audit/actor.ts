/** Who acts, as the audit trail names them. */
export interface Actor {
  accountId: string;
  accountUid: string;
  name: string;
  /** The role that allowed the act; null where none was needed, such as at sign-in. */
  role: string | null;
  sessionUid: string | null;
  requestId: string | null;
}

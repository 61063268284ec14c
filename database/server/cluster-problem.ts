/** Why the private PostgreSQL could not be brought up. The sentence for each code stands with the words of the command. */
export type ClusterProblemCode =
  | 'postgres-missing'
  | 'postgres-version-missing'
  | 'apt-failed'
  | 'no-unprivileged-user'
  | 'no-data-folder'
  | 'data-folder-unusable'
  | 'initdb-failed'
  | 'cluster-failed'
  | 'cluster-timeout'
  | 'cluster-foreign'
  | 'locked';

export class ClusterProblem extends Error {
  readonly code: ClusterProblemCode;
  readonly params: Readonly<Record<string, string>>;

  constructor(code: ClusterProblemCode, params: Record<string, string> = {}) {
    const detail = Object.entries(params).map(([name, value]) => `${name}: ${value}`);
    super([code, ...detail].join('; '));
    this.name = 'ClusterProblem';
    this.code = code;
    this.params = params;
  }
}

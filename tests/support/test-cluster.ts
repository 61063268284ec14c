import type { RoleSettings } from '../../database/role-names.ts';

/** What a test file needs to know about the PostgreSQL of this run. */
export interface TestCluster extends RoleSettings {
  /** Address as a user who may make databases. */
  adminUrl: string;
  /** Migrated, with its queues and no rows: every test file gets a copy. */
  template: string;
  databasePrefix: string;
}

declare module 'vitest' {
  export interface ProvidedContext {
    cluster: TestCluster;
    /** Folder of the pages as they were built for this run. */
    webFolder: string;
  }
}

import type { RoleSettings } from '../../database/role-names.ts';

/** What a test file needs to know about the PostgreSQL of this run. */
export interface TestCluster extends RoleSettings {
  /** Address as a user who may make databases. */
  adminUrl: string;
  /** Migrated, with its queues and no rows: every test file gets a copy. */
  template: string;
  databasePrefix: string;
}

/** Of tests alone: what it derives is the same in the process that plays the demo and in those that open it. */
export const TEST_MASTER_SECRET = '5e'.repeat(32);

declare module 'vitest' {
  export interface ProvidedContext {
    cluster: TestCluster;
    /** Folder of the pages as they were built for this run. */
    webFolder: string;
    /** The demo, played once: its database to copy and the folder of its files. */
    demo: { template: string; folder: string };
  }
}

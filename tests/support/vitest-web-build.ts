import { resolve } from 'node:path';
import type { TestProject } from 'vitest/node';
import { buildWeb } from '../../api/cli/build-web.ts';
import './test-cluster.ts';

/** The pages as people get them: one build for the run, none where nothing has changed since the last. */
export async function setup(project: TestProject): Promise<void> {
  const root = resolve(import.meta.dirname, '../..');
  project.provide('webFolder', await buildWeb(root));
}

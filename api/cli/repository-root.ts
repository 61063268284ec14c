import { fileURLToPath } from 'node:url';

/** The folder of the checkout, from where this file lies in it. */
export const repositoryRoot = fileURLToPath(new URL('../..', import.meta.url));

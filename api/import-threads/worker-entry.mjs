// A thread starts without the loader of TypeScript that its parent has, so it registers its own first.
import { register } from 'tsx/esm/api';

register();
export const { inspect, rows } = await import('./worker.ts');

/**
 * Runs the benches of this folder: `npm run bench` runs all, `npm run bench -- engine start` those named.
 * A bench is a file NAME.bench.ts that exports `title` and `run()`; it prints its own lines and throws
 * when something it needs is not there.
 */
import { readdirSync } from 'node:fs';
import { availableParallelism, loadavg } from 'node:os';
import { MissingTool } from './missing-tool.ts';

interface Bench {
  title: string;
  run(): Promise<void>;
}

const here = new URL('./', import.meta.url);
const known = readdirSync(here)
  .filter((name) => name.endsWith('.bench.ts'))
  .map((name) => name.slice(0, -'.bench.ts'.length))
  .sort();

async function main(asked: string[]): Promise<number> {
  const strange = asked.filter((name) => !known.includes(name));
  if (strange.length > 0) {
    console.error(`There is no bench "${strange.join('", "')}". Known: ${known.join(', ')}.`);
    return 2;
  }
  for (const name of asked.length > 0 ? asked : known) {
    warnIfBusy();
    const bench = (await import(new URL(`${name}.bench.ts`, here).href)) as Bench;
    console.log(`\n${bench.title}`);
    try {
      await bench.run();
    } catch (error) {
      if (!(error instanceof MissingTool)) throw error;
      console.error(error.message);
      return 2;
    }
  }
  return 0;
}

/** Times by the wall clock mean little while others use the machine; ratios of interleaved runs still do. */
function warnIfBusy(): void {
  const load = loadavg()[0] ?? 0;
  const cores = availableParallelism();
  if (load > cores) {
    console.log(
      `\nThe machine is busy (load ${load.toFixed(1)} on ${cores} cores): limits are not judged fairly.`,
    );
  }
}

process.exitCode = await main(process.argv.slice(2));

/** `npm run first-owner`: makes the first administrator, owner and study from a set-up file. */
import { readFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { openDatabases } from '../../database/data-source.ts';
import { systemClock } from '../clock.ts';
import { loadConfig } from '../config.ts';
import type { SetupFile } from '../contracts/setup.ts';
import { makeFirstOwner } from '../features/setup/first-owner.ts';
import { readSetupFile } from '../features/setup/read-file.ts';
import { fillSentence, Problem, problemTable } from '../http/problems.ts';
import { prepareDatabase } from '../prepare-database.ts';
import { commandWords } from '../words/commands.ts';
import { askHidden, readLines } from './ask-password.ts';
import { runOrExplain } from './failure.ts';
import { openInstallation } from './installation.ts';
import { repositoryRoot } from './repository-root.ts';

const REFUSED = 2;

/** Thrown, so that what was started is stopped before the command ends. */
class CommandRefused extends Error {}

function refuse(text: string): never {
  throw new CommandRefused(text);
}

function readArguments() {
  try {
    return parseArgs({
      options: {
        admin: { type: 'string' },
        owner: { type: 'string' },
        setup: { type: 'string' },
        'admin-name': { type: 'string' },
        'owner-name': { type: 'string' },
        help: { type: 'boolean' },
      },
    }).values;
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    return refuse(`${message}\n\n${commandWords.firstOwnerUsage}`);
  }
}

function needed(value: string | undefined, flag: string): string {
  return (
    value ?? refuse(`${commandWords.firstOwnerMissing(flag)}\n\n${commandWords.firstOwnerUsage}`)
  );
}

function readSetup(file: string): SetupFile {
  let text: string;
  try {
    text = readFileSync(file, 'utf8');
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    return refuse(commandWords.firstOwnerFile(file, code ?? message));
  }
  return readSetupFile(text);
}

async function readPasswords(): Promise<[string, string]> {
  if (!process.stdin.isTTY) {
    const [administrator, owner] = await readLines(2);
    return administrator === undefined || owner === undefined
      ? refuse(commandWords.firstOwnerPasswordsMissing)
      : [administrator, owner];
  }
  const passwords: string[] = [];
  for (const who of ['administrator', 'owner']) {
    const password = await askHidden(commandWords.askPassword(who));
    if (password !== (await askHidden(commandWords.askAgain(who)))) {
      refuse(commandWords.passwordsDiffer);
    }
    passwords.push(password);
  }
  return [passwords[0] as string, passwords[1] as string];
}

function problemText(problem: Problem): string {
  const lines = problem.errors.map(({ path, message }) => `  ${path}: ${message}`);
  const detail = fillSentence(problemTable[problem.code].detail, problem.params);
  return [detail, ...lines, commandWords.nothingMade].join('\n');
}

const nameFrom = (email: string): string => email.split('@', 1)[0] || email;

async function run(): Promise<void> {
  const given = readArguments();
  if (given.help) {
    console.log(commandWords.firstOwnerUsage);
    return;
  }
  if (loadConfig(process.env).demo) {
    refuse(commandWords.firstOwnerDemo);
  }
  const adminEmail = needed(given.admin, '--admin');
  const ownerEmail = needed(given.owner, '--owner');
  const setupFile = needed(given.setup, '--setup');
  // What can be refused without the database is refused before a password is asked.
  const setup = readSetup(setupFile);
  const installation = await openInstallation(repositoryRoot, process.env, async (opened) => {
    await prepareDatabase(opened.ownerUrl, opened.roles);
  });
  const databases = await openDatabases({ urls: installation.urls, poolSize: 1 });
  try {
    const [administrator, owner] = await readPasswords();
    const study = await makeFirstOwner(databases.masked, systemClock, {
      administrator: {
        email: adminEmail,
        name: given['admin-name'] ?? nameFrom(adminEmail),
        password: administrator,
      },
      owner: {
        email: ownerEmail,
        name: given['owner-name'] ?? nameFrom(ownerEmail),
        password: owner,
      },
      setup,
    });
    console.log(commandWords.firstOwnerDone(study.name, ownerEmail, adminEmail));
  } finally {
    await databases.close();
    await installation.close();
  }
}

await runOrExplain(async () => {
  try {
    await run();
  } catch (error) {
    if (error instanceof Problem || error instanceof CommandRefused) {
      console.error(error instanceof Problem ? problemText(error) : error.message);
      process.exitCode = REFUSED;
      return;
    }
    throw error;
  }
});

/** `npm run migrate`: brings the database of this installation to the present schema. */
import { prepareDatabase } from '../prepare-database.ts';
import { commandWords } from '../words/commands.ts';
import { runOrExplain } from './failure.ts';
import { openInstallation } from './installation.ts';
import { repositoryRoot } from './repository-root.ts';

await runOrExplain(async () => {
  let migrated: string[] = [];
  const installation = await openInstallation(repositoryRoot, process.env, async (opened) => {
    migrated = await prepareDatabase(opened.ownerUrl, opened.roles);
  });
  await installation.close();
  console.log(commandWords.migrated(migrated));
});

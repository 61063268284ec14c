/** `npm run verify-audit`: checks every audit chain, and names the first broken link of each. */
import { openDatabases } from '../../database/data-source.ts';
import { verifyChains } from '../audit/verify.ts';
import { openStore } from '../storage/open-store.ts';
import { commandWords } from '../words/commands.ts';
import { runOrExplain } from './failure.ts';
import { openInstallation } from './installation.ts';
import { repositoryRoot } from './repository-root.ts';

await runOrExplain(async () => {
  const installation = await openInstallation(repositoryRoot, process.env);
  const { config, dataFolder, secrets, urls } = installation;
  const databases = await openDatabases({ urls, poolSize: 1 });
  const { store, close } = await openStore(config.storage, {
    dataFolder,
    key: secrets.storageKey,
  });
  try {
    const found = await verifyChains(databases.masked, store);
    if (found.broken.length > 0) {
      console.error(found.broken.map(commandWords.auditBroken).join('\n'));
      console.error(commandWords.auditNextStep);
      process.exitCode = 1;
    } else {
      console.log(commandWords.auditWhole(found.chains, found.entries, found.anchors));
    }
  } finally {
    await close();
    await databases.close();
    await installation.close();
  }
});

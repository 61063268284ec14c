import 'reflect-metadata';
import pg from 'pg';
import { DataSource } from 'typeorm';
import { recordEntities } from './entities/index.ts';
import { sealedEntities } from './entities/sealed/index.ts';
import { migrations } from './migrations/index.ts';
import { SnakeNaming } from './naming.ts';
import type { ByDatabaseRole } from './role-names.ts';

// A calendar date is text everywhere: as an instant it would move by a day with the zone of the process.
pg.types.setTypeParser(pg.types.builtins.DATE, (text) => text);

export interface DatabaseSettings {
  urls: ByDatabaseRole<string>;
  /** Connections a role may hold at once; the masked one serves nearly all requests. */
  poolSize?: number;
}

/** One pool and one DataSource a database role: what a request may see is decided by which it gets. */
export interface Databases extends ByDatabaseRole<DataSource> {
  close(): Promise<void>;
}

const FEW = 3;

type Entities = (typeof recordEntities | typeof sealedEntities)[number][];

function build(url: string, name: string, entities: Entities, poolSize: number): DataSource {
  return new DataSource({
    type: 'postgres',
    url,
    applicationName: `tetherline ${name}`,
    entities,
    namingStrategy: new SnakeNaming(),
    synchronize: false,
    logging: false,
    extra: { max: poolSize },
  });
}

/**
 * Connects all three roles. The masked and the board source don't list the sealed entities: a repository
 * for one of them can't even be asked for.
 */
export async function openDatabases(settings: DatabaseSettings): Promise<Databases> {
  const poolSize = settings.poolSize ?? 10;
  const sources: ByDatabaseRole<DataSource> = {
    masked: build(settings.urls.masked, 'masked', recordEntities, poolSize),
    board: build(settings.urls.board, 'board', recordEntities, Math.min(FEW, poolSize)),
    open: build(
      settings.urls.open,
      'open',
      [...recordEntities, ...sealedEntities],
      Math.min(FEW, poolSize),
    ),
  };
  const close = async (): Promise<void> => {
    for (const source of Object.values(sources)) {
      if (source.isInitialized) {
        await source.destroy();
      }
    }
  };
  try {
    for (const source of Object.values(sources)) {
      await source.initialize();
    }
  } catch (error) {
    await close();
    throw error;
  }
  return { ...sources, close };
}

/** The source that migrates, as the owner of the database. */
export function ownerDataSource(ownerUrl: string): DataSource {
  return new DataSource({
    type: 'postgres',
    url: ownerUrl,
    applicationName: 'tetherline owner',
    entities: [...recordEntities, ...sealedEntities],
    migrations,
    migrationsTableName: 'schema_migration',
    migrationsTransactionMode: 'all',
    namingStrategy: new SnakeNaming(),
    synchronize: false,
    logging: false,
    extra: { max: 2 },
  });
}

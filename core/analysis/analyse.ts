import type { ClusterContrast } from '../cluster/cluster-line.ts';
import { known, type Maybe, notKnown } from '../errors.ts';
import { ownLines } from '../lines/own-lines.ts';
import type { GroupedTable, LongTable } from '../table/long-table.ts';
import { type Structure, structureOf } from '../table/structure.ts';
import { ENGINE_VERSION } from '../version.ts';
import { dropWords, lockedText, reasonText, STAMP } from '../words/en.ts';
import { adviceOn } from './advice.ts';
import { independenceBlock } from './independence-block.ts';
import { fitMeanModel, type MeanModel, usableReadings } from './mean-model.ts';
import { type Nullable, nullable, orReason } from './nullable.ts';
import { type AnalyseOptions, type Settings, settingsOf } from './options.ts';
import { ordinaryBlock } from './ordinary-block.ts';
import { ownLinesBlock } from './own-lines-block.ts';
import { groupTest, pooledCoefficients, robustContrasts, wildBlocks } from './pooled-block.ts';
import type {
  AnalysisResult,
  GroupTestBlock,
  InputBlock,
  OrdinaryBlock,
  PooledBlock,
  StructureBlock,
} from './result.ts';
import { withinBetween } from './within-block.ts';

function inputBlock(table: GroupedTable, sha256: string | null): InputBlock {
  return {
    rows: table.rows,
    used: table.time.length,
    dropped: table.dropped.map(({ line, reason }) => ({ line, reason: dropWords[reason] })),
    ...nullable('sha256', orReason(sha256, 'no_source')),
  };
}

function structureBlock(structure: Structure): StructureBlock {
  return {
    subjects: structure.subjects,
    readings: structure.readings,
    subjects_with_repeats: structure.subjectsWithRepeats,
    repeats: { ...structure.repeats },
    distinct_times: structure.distinctTimes,
    replicates: structure.replicates,
    share_following: structure.shareFollowing,
  };
}

/** The ordinary fit, its lock, and what opened it. */
function ordinaryPart(
  model: MeanModel,
  settings: Settings,
): Nullable<'ols', OrdinaryBlock> & Nullable<'ols_locked', string> {
  const { structure } = model;
  const repeats = structure.subjectsWithRepeats > 0;
  const locked = repeats && settings.acknowledge === null;
  let lock: Maybe<string> = notKnown(repeats ? 'open_acknowledged' : 'open_no_repeats');
  if (locked) lock = known(lockedText(structure.readings, structure.subjects));
  let ols: Maybe<OrdinaryBlock> = notKnown(locked ? 'locked' : 'left_out');
  if (!locked && settings.wants('ols')) {
    const block = settings.observe('ols', () => ordinaryBlock(model));
    const stamped = repeats ? { stamp: STAMP, acknowledged: settings.acknowledge ?? '' } : {};
    ols = known({ ...block, ...stamped });
  }
  return { ...nullable('ols', ols), ...nullable('ols_locked', lock) };
}

function pooledPart(
  model: MeanModel,
  contrasts: readonly ClusterContrast[],
  settings: Settings,
): Maybe<PooledBlock> {
  const robust = settings.wants('cr');
  if (!robust && !settings.wants('wild')) return notKnown('left_out');
  const wild = settings.wants('wild')
    ? settings.observe('wild_bootstrap', () => wildBlocks(model, settings.draws, settings.seed))
    : notKnown('left_out');
  const coefficients = robust ? known(pooledCoefficients(model, contrasts)) : notKnown('left_out');
  const test: Maybe<GroupTestBlock> = robust ? groupTest(model) : notKnown('left_out');
  return known({
    ...nullable('coefficients', coefficients),
    ...nullable('wild_bootstrap', wild),
    ...nullable('group_test', test),
  });
}

/**
 * Analyses a long table: structure, independence check, ordinary line (locked where a subject repeats), own lines
 * and pooled line with cluster-robust errors. The same table, options and engine version give the same bytes.
 *
 * @throws StatsError on input that no line can be fitted to, or options out of range
 */
export function analyse(long: LongTable, options: AnalyseOptions = {}): AnalysisResult {
  const settings = settingsOf(options);
  const { observe, wants } = settings;
  const { table, structure } = observe('structure', () => {
    const grouped = usableReadings(long);
    return { table: grouped, structure: structureOf(grouped) };
  });
  const { model, contrasts } = observe('cr2', () => {
    const fitted = fitMeanModel(table, structure);
    return { model: fitted, contrasts: robustContrasts(fitted) };
  });
  const check = wants('check')
    ? known(
        observe('independence', () =>
          independenceBlock(model, contrasts, settings.draws, settings.seed, observe),
        ),
      )
    : notKnown('left_out');
  const own = observe('per_subject', () => ownLines(table));
  const lines = wants('lines')
    ? known(ownLinesBlock(own, table.subjects, structure))
    : notKnown('left_out');
  const split = wants('within') ? withinBetween(table, structure) : notKnown('left_out');
  return {
    format: 'tetherline-analysis/1',
    engine: ENGINE_VERSION,
    seed: settings.seed,
    ...nullable('group_levels', orReason(table.levels ? [...table.levels] : null, 'no_group')),
    input: inputBlock(table, settings.sha256),
    structure: structureBlock(structure),
    ...nullable('independence', check),
    ...ordinaryPart(model, settings),
    ...nullable('per_subject', lines),
    ...nullable('pooled', pooledPart(model, contrasts, settings)),
    lmm: null,
    lmm_reason: reasonText({ code: wants('lmm') ? 'not_fitted_mixed' : 'left_out' }),
    gee: null,
    gee_reason: reasonText({ code: wants('gee') ? 'not_fitted_gee' : 'left_out' }),
    ...nullable('within_between', split),
    assumptions: null,
    assumptions_reason: reasonText({
      code: wants('assumptions') ? 'not_checked_assumptions' : 'left_out',
    }),
    advice: wants('check') ? adviceOn(model, contrasts, own) : [],
  };
}

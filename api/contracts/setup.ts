/** How a study is set up: the `tetherline-setup/1` file it is made from, and the owner's view of it. */
import { z } from 'zod';
import { timeZoneSchema, uidSchema } from './common.ts';

export const SETUP_FORMAT = 'tetherline-setup/1';

export const measureNatures = ['continuous', 'positive', 'count', 'yes_no', 'choice'] as const;
export const concerns = ['high', 'low', 'both'] as const;

/** Names of the columns that every cut has, or may have. */
export const reservedColumns = [
  'subject',
  'site',
  'visit',
  'planned',
  'day',
  'planned_day',
  'replicate',
  'group',
  'code',
  'stamp',
] as const;

/** Read as "no value" wherever a table is read. */
const saysMissing = (text: string) => /^(na|n\/a|nan|null|\.)$/i.test(text);
const MISSING_NAME = 'This is read as a missing value: choose another.';

export const codeSchema = z
  .string()
  .regex(
    /^[A-Za-z0-9][A-Za-z0-9._-]{0,31}$/,
    'Use 1 to 32 letters, digits, dots, underscores and hyphens, a letter or digit first.',
  )
  .refine((code) => !saysMissing(code), MISSING_NAME);

export const shortNameSchema = z
  .string()
  .regex(
    /^[a-z][a-z0-9_]{0,30}$/,
    'Use 1 to 31 lower-case letters, digits and underscores, a letter first.',
  )
  .refine(
    (name) => !name.endsWith('_note'),
    'A short name does not end with _note: choose another.',
  )
  .refine(
    (name) => !(reservedColumns as readonly string[]).includes(name),
    'Every cut has a column of this name: choose another.',
  );

const line = (longest: number) =>
  z
    .string()
    .trim()
    .min(1)
    .max(longest)
    .regex(/^\P{Cc}*$/u, 'Write it on one line, without tabs or other control characters.');

/** Stands in the file of a cut as it is, where nothing is neutralised: so a formula is refused here. */
const cellName = (longest: number) =>
  line(longest)
    .refine(
      (name) => !/^[=+\-@]/.test(name),
      'A name does not begin with = + - or @, since a spreadsheet would calculate it: choose another.',
    )
    .refine((name) => !saysMissing(name), MISSING_NAME);

const siteSchema = z.strictObject({
  code: codeSchema,
  name: line(120),
  timeZone: timeZoneSchema,
});

const choiceSchema = z.strictObject({ code: codeSchema, label: line(120) });

const limit = z.number().nullable().default(null);

const measureFieldsSchema = z.strictObject({
  shortName: shortNameSchema,
  label: line(120),
  unit: line(30).nullable().default(null),
  decimals: z.number().int().min(0).max(10).default(0),
  nature: z.enum(measureNatures),
  per: z.enum(['visit', 'subject']).default('visit'),
  /** Outside: asked, and kept only with an explanation. */
  plausibleLow: limit,
  plausibleHigh: limit,
  /** Outside: refused. */
  impossibleLow: limit,
  impossibleHigh: limit,
  alertLow: limit,
  alertHigh: limit,
  /** The direction that harms. */
  concern: z.enum(concerns).nullable().default(null),
  choices: z.array(choiceSchema).min(2).max(50).nullable().default(null),
});

const measureSchema = measureFieldsSchema.superRefine((measure, context) => {
  const fault = (path: string, message: string) =>
    context.addIssue({ code: 'custom', path: [path], message });
  if (measure.nature === 'choice' && measure.choices === null) {
    fault('choices', 'List the choices, each with a code and a label.');
  }
  if (measure.nature !== 'choice' && measure.choices !== null) {
    fault('choices', 'Only a measure of nature "choice" has choices: leave them out.');
  }
  for (const [low, high] of [
    ['plausibleLow', 'plausibleHigh'],
    ['impossibleLow', 'impossibleHigh'],
    ['alertLow', 'alertHigh'],
  ] as const) {
    const [from, to] = [measure[low], measure[high]];
    if (from !== null && to !== null && from >= to) {
      fault(high, `This must be larger than ${low}.`);
    }
  }
  if (outside(measure.plausibleLow, measure)) {
    fault('plausibleLow', 'This lies in the impossible range: move one of the two.');
  }
  if (outside(measure.plausibleHigh, measure)) {
    fault('plausibleHigh', 'This lies in the impossible range: move one of the two.');
  }
});

function outside(
  value: number | null,
  range: { impossibleLow: number | null; impossibleHigh: number | null },
): boolean {
  if (value === null) {
    return false;
  }
  return (
    (range.impossibleLow !== null && value < range.impossibleLow) ||
    (range.impossibleHigh !== null && value > range.impossibleHigh)
  );
}

const plannedVisitFieldsSchema = z.strictObject({
  name: cellName(60).refine(
    (name) => name !== 'unscheduled',
    'A visit outside the plan is called unscheduled: choose another name.',
  ),
  /** Days from baseline, which is day 0. */
  targetDay: z.number().int().min(-3650).max(36500),
  windowBefore: z.number().int().min(0).max(3650).default(0),
  windowAfter: z.number().int().min(0).max(3650).default(0),
});

export const setupFileSchema = z
  .strictObject({
    format: z.literal(SETUP_FORMAT),
    study: z.strictObject({
      name: line(200),
      shortName: line(40),
      masked: z.boolean(),
      /** Days before a window ends in which an open visit counts as closing. */
      closingDays: z.number().int().min(0).max(60).default(3),
      /** Days after its visit from which a reading counts as late. */
      lateDays: z.number().int().min(0).max(365).default(14),
    }),
    sites: z.array(siteSchema).min(1).max(500),
    /** Names only, in the order of the protocol; may be empty where nothing is compared. */
    arms: z.array(cellName(80)).max(20).default([]),
    measures: z.array(measureSchema).min(1).max(500),
    visits: z.array(plannedVisitFieldsSchema).min(1).max(500),
  })
  .superRefine((setup, context) => {
    const once = (values: (string | number)[], list: string, field: string | null) => {
      values.forEach((value, index) => {
        if (values.indexOf(value) < index) {
          const path = field === null ? [list, index] : [list, index, field];
          context.addIssue({
            code: 'custom',
            path,
            message: `"${value}" stands here twice: each must be its own.`,
          });
        }
      });
    };
    once(
      setup.sites.map((site) => site.code),
      'sites',
      'code',
    );
    once(setup.arms, 'arms', null);
    once(
      setup.measures.map((measure) => measure.shortName),
      'measures',
      'shortName',
    );
    once(
      setup.visits.map((visit) => visit.name),
      'visits',
      'name',
    );
    once(
      setup.visits.map((visit) => visit.targetDay),
      'visits',
      'targetDay',
    );
  });
export type SetupFile = z.infer<typeof setupFileSchema>;
/** The file as it is written, before defaults are filled in. */
export type SetupFileInput = z.input<typeof setupFileSchema>;

/** What the owner reads. Arm names are in the protocol and no secret; who is in which is not here. */
export const setupViewSchema = z.object({
  study: z.object({
    id: uidSchema,
    name: z.string(),
    shortName: z.string(),
    masked: z.boolean(),
    state: z.enum(['open', 'locked', 'closed']),
    closingDays: z.number().int(),
    lateDays: z.number().int(),
  }),
  sites: z.array(
    z.object({ id: uidSchema, code: z.string(), name: z.string(), timeZone: z.string() }),
  ),
  arms: z.array(z.string()),
  measures: z.array(measureFieldsSchema.extend({ id: uidSchema })),
  visits: z.array(plannedVisitFieldsSchema.extend({ id: uidSchema })),
});
export type SetupView = z.infer<typeof setupViewSchema>;

/**
 * The whole way of a real data set (sleepstudy: 18 subjects, ten days), by clicks alone: file, subjects,
 * cut, warning, lock, fits, files, signature. The tests follow each other and share one study.
 */
import { createHash } from 'node:crypto';
import { resolve } from 'node:path';
import Papa from 'papaparse';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoPeople } from '../../seeds-demo/people.ts';
import { PALETTE } from '../../web/charts/export/palette.ts';
import { words } from '../../web/words/en.ts';
import { expectNoAxeViolations, type TestPage } from '../support/browser.ts';
import { pixelsAtTopRight, textsInSvg, wordsInPng } from './files.ts';
import {
  choose,
  daysAgo,
  downloaded,
  enter,
  goTo,
  heading,
  type Running,
  STUDIES,
  settled,
  startDemo,
  tick,
} from './steps.ts';

const FILE = resolve(import.meta.dirname, '../reference/sleepstudy/data.csv');
const BASELINE = daysAgo(40);
const STAMP = 'independence not met';
const { imports, cuts, check, fit, records, analysis } = words;
/** What a refused request leaves in the console; each test names those it provokes. */
const CONFLICT = '409';

let running: Running;
beforeAll(async () => {
  running = await startDemo();
});
afterAll(() => running?.close());

async function uploadAndCheck(page: Page): Promise<void> {
  await page.getByLabel(imports.file, { exact: true }).setInputFiles(FILE);
  await page.getByRole('button', { name: imports.upload }).click();
  await heading(page, 'data.csv').waitFor();
  await choose(page, 'Column Subject holds', imports.meanings.subject);
  await choose(page, 'Column Days holds', imports.meanings.days);
  await choose(page, 'Column Reaction holds', 'Reaction time in ms');
  await page.getByText('values like 249.56').waitFor();
  await tick(page, imports.newEnrol);
  await choose(page, imports.newSite, 'Laboratory');
  await page.getByLabel(imports.newConsentVersion, { exact: true }).fill('2.0');
  await page.getByLabel(imports.newConsentDate, { exact: true }).fill(daysAgo(50));
  await page.getByLabel(imports.newBaselineDate, { exact: true }).fill(BASELINE);
  await expectNoAxeViolations(page);
  await page.getByRole('button', { name: imports.check }).click();
  await page.getByRole('heading', { name: imports.outcomeHeading }).waitFor();
}

describe('a coordinator', () => {
  let visitor: TestPage;
  beforeAll(async () => {
    visitor = await enter(running, 'coordinator', STUDIES.empty);
  });
  afterAll(() => visitor?.context.close());

  it('imports a file of readings after a dry run that writes nothing', async () => {
    const { page } = visitor;
    await goTo(page, 'import');
    await uploadAndCheck(page);
    await page.getByText('180 readings would be written.').waitFor();
    await page.getByText('18 subjects would be enrolled.').waitFor();
    await page.getByText('180 visits would be logged.').waitFor();
    const [before] = await running.app.database.query(
      `SELECT count(*)::int AS subjects FROM subject x JOIN study s ON s.id = x.study_id WHERE s.short_name = 'reaction'`,
    );
    expect(before).toEqual({ subjects: 0 });
    await expectNoAxeViolations(page);

    await page.getByRole('button', { name: 'Write 180 readings' }).click();
    await heading(page, imports.appliedHeading).waitFor();
    await page.getByText('180 readings came with this file.').waitFor();
    await expectNoAxeViolations(page);
    visitor.expectNoComplaints();
  });

  it('reads the subjects and one of them, also after loading the pages again', async () => {
    const { page } = visitor;
    await page.getByRole('link', { name: imports.toSubjects }).click();
    await heading(page, words.subjects.heading).waitFor();
    await page.reload();
    await page.getByText('18 subjects', { exact: true }).waitFor();
    await page.getByRole('link', { name: '308', exact: true }).click();
    await heading(page, '308').waitFor();
    await page.reload();
    await page.getByText('Laboratory. 10 of 10 visits due so far are done.').waitFor();
    const first = page.getByRole('row').filter({ hasText: 'Day 0' });
    expect(await first.textContent()).toContain('249.56');
    expect(await first.textContent()).toContain('done');
    await page.getByText('version 2.0', { exact: false }).waitFor();
    visitor.expectNoComplaints();
  });

  it('is told that the same file brings nothing new', async () => {
    const { page } = visitor;
    await goTo(page, 'import');
    await uploadAndCheck(page);
    await page.getByText('180 rows are known already and change nothing.').waitFor();
    await heading(page, imports.nothingNewHeading).waitFor();
    await goTo(page, 'subjects');
    await page.getByText('18 subjects', { exact: true }).waitFor();
    visitor.expectNoComplaints();
  });
});

describe('an analyst', () => {
  let visitor: TestPage;
  let page: Page;
  let pooledRecord = '';
  beforeAll(async () => {
    visitor = await enter(running, 'analyst', STUDIES.empty);
    page = visitor.page;
  });
  afterAll(() => visitor?.context.close());

  it('freezes a cut whose file hashes to the number shown', async () => {
    await goTo(page, 'cuts');
    await page.getByRole('link', { name: cuts.freezeLink }).click();
    await page.getByLabel(cuts.name, { exact: true }).fill('ten days');
    await page.getByLabel(cuts.visitCutoff, { exact: true }).fill(daysAgo(1));
    await page.getByRole('definition').getByText('180', { exact: true }).first().waitFor();
    await expectNoAxeViolations(page);
    await page.getByRole('button', { name: cuts.freeze }).click();
    await heading(page, /^Cut 1, ten days: visits to /).waitFor();
    const shown = await page.locator('dd code').first().textContent();
    const { bytes } = await downloaded(page, page.getByRole('button', { name: cuts.download }));
    expect(createHash('sha256').update(bytes).digest('hex')).toBe(shown);
    await page.reload();
    await heading(page, /^Cut 1, ten days: visits to /).waitFor();
    expect(await page.locator('dd code').first().textContent()).toBe(shown);
    await settled(page);
    await expectNoAxeViolations(page);
    visitor.expectNoComplaints();
  });

  it('is warned by the check before any fit', async () => {
    await page.getByRole('link', { name: cuts.checkLink }).click();
    await heading(page, check.heading).waitFor();
    await choose(page, analysis.measureLabel, 'Reaction time');
    await tick(page, analysis.axes.since_baseline);
    await tick(page, analysis.units.days);
    await page.getByRole('button', { name: check.open }).click();
    await heading(page, 'These 180 readings are not 180 independent observations').waitFor();
    await page.getByText('They come from 18 subjects, each with two or more.').waitFor();
    await page.getByText(check.locked).waitFor();
    await settled(page);
    await expectNoAxeViolations(page);
    visitor.expectNoComplaints();
  });

  it('meets a lock on the ordinary line that a short reason does not open', async () => {
    await page.getByRole('button', { name: check.lockOpen }).click();
    await page.getByLabel(check.lockReason).fill('because');
    await page.getByText('7 of at least 20 characters').waitFor();
    await page.getByRole('button', { name: check.lockAct }).click();
    await page.getByRole('alert').waitFor();
    expect(await page.getByText(check.locked).isVisible()).toBe(true);
    expect(await page.getByLabel(check.lockReason).inputValue()).toBe('because');
    await expectNoAxeViolations(page);
    visitor.expectNoComplaints();
  });

  it('can’t walk round the lock by the address of the fit', async () => {
    const atCheck = page.url();
    const around = new URL(atCheck);
    around.pathname = around.pathname.replace(/check$/, 'fit');
    around.searchParams.set('fit', 'ordinary');
    await page.goto(around.href);
    await tick(page, fit.exploratory);
    await page.getByRole('button', { name: fit.run }).click();
    await page
      .getByRole('alert')
      .getByText(/^An ordinary straight line takes these/)
      .waitFor();
    visitor.expectNoComplaints([CONFLICT]);
    await page.goto(atCheck);
    await page.getByText(check.locked).waitFor();
  });

  it('says what the pooled fit is for, and reads slope and robust error on the screen', async () => {
    await page.getByRole('link', { name: check.fitPooled }).click();
    await heading(page, fit.heading).waitFor();
    expect(await page.getByRole('radio').count()).toBe(2);
    expect(await page.getByRole('radio', { checked: true }).count()).toBe(0);
    await page.getByRole('button', { name: fit.run }).click();
    await page.getByRole('alert').getByText(fit.choose).waitFor();
    await expectNoAxeViolations(page);
    await tick(page, fit.planned);
    await page.getByRole('button', { name: fit.run }).click();
    await heading(page, /^Reaction time rises by 10\.5 ms a day, 95 % interval /).waitFor();
    pooledRecord = page.url();
    await page.getByText(records.errorsShow).click();
    const trend = page
      .getByRole('table', { name: records.errorsHeading })
      .getByRole('row')
      .filter({ hasText: 'Trend' });
    const cells = await trend.getByRole('cell').allTextContents();
    expect(cells).toContain('10.467');
    expect(cells).toContain('1.546');
    expect(await page.getByText(STAMP).count()).toBe(0);
    await settled(page);
    await expectNoAxeViolations(page);
    visitor.expectNoComplaints();
  });

  it('finds the record again in the list and by its address', async () => {
    const said = await page.getByRole('heading', { level: 1 }).textContent();
    await goTo(page, 'records');
    await heading(page, '1 analysis is recorded').waitFor();
    await page.getByRole('row').nth(1).getByRole('link').click();
    await heading(page, said ?? '').waitFor();
    expect(page.url()).toBe(pooledRecord);
    await page.reload();
    await heading(page, said ?? '').waitFor();
    visitor.expectNoComplaints();
  });

  it('signs it with the password, which a wrong one does not', async () => {
    const me = demoPeople.find(({ role }) => role === 'analyst');
    await page.getByRole('button', { name: records.sign }).click();
    const dialog = page.getByRole('alertdialog');
    await tick(dialog, records.meanings[0]);
    await dialog.getByLabel(words.signing.password).fill('not the password');
    await dialog.getByRole('button', { name: records.sign }).click();
    await dialog.getByRole('alert').waitFor();
    await expectNoAxeViolations(page);
    await dialog.getByLabel(words.signing.password).fill(me?.password ?? '');
    await dialog.getByRole('button', { name: records.sign }).click();
    await dialog.waitFor({ state: 'detached' });
    await page.reload();
    const signature = page.getByRole('table', { name: records.signaturesCaption });
    await signature.getByText(me?.name ?? '').waitFor();
    await signature.getByText(records.signatureValid).waitFor();
    visitor.expectNoComplaints(['403', '422', '409']);
  });

  it('opens the lock with a reason, and every number then carries the stamp', async () => {
    await page.getByRole('link', { name: records.again }).click();
    await page.getByRole('button', { name: check.lockOpen }).click();
    await page.getByLabel(check.lockReason).fill('Shown beside the robust one in teaching.');
    await page.getByRole('button', { name: check.lockAct }).click();
    await page.getByText(check.unlocked).waitFor();
    await page.getByRole('link', { name: check.fitOrdinary }).click();
    await heading(page, fit.heading).waitFor();
    expect(await page.getByRole('radio', { checked: true }).count()).toBe(0);
    await tick(page, fit.exploratory);
    await page.getByRole('button', { name: fit.run }).click();
    await heading(page, /^Reaction time rises by 10\.5 ms a day/).waitFor();
    expect(await page.getByText(STAMP, { exact: true }).count()).toBeGreaterThan(2);
    await page.getByText('Shown beside the robust one in teaching.').waitFor();
    await settled(page);
    await expectNoAxeViolations(page);
    visitor.expectNoComplaints();
  });

  it('takes the stamp along in every file', async () => {
    const picture = page.getByRole('figure', { name: /subject by subject$/ });
    await picture.getByRole('button', { name: words.charts.figure.export }).click();
    const file = (kind: 'svg' | 'png' | 'csv') =>
      downloaded(
        page,
        picture.getByRole('button', { name: words.charts.figure.kinds[kind], exact: true }),
      );

    const svg = await file('svg');
    expect(svg.name).toMatch(/\.svg$/);
    expect(await textsInSvg(page, svg.bytes)).toContain(STAMP);

    const png = await file('png');
    expect(wordsInPng(png.bytes)).toMatchObject({ Warning: STAMP });
    const ink = PALETTE['flare-ink'] ?? '';
    expect(await pixelsAtTopRight(page, png.bytes, ink)).toBeGreaterThan(200);

    const csv = await file('csv');
    const { data } = Papa.parse<Record<string, string>>(csv.bytes.toString('utf8'), {
      header: true,
      skipEmptyLines: true,
    });
    expect(data).toHaveLength(180);
    expect(data.every((row) => row.stamp === STAMP)).toBe(true);

    const json = await downloaded(page, page.getByRole('button', { name: records.download }));
    expect(JSON.parse(json.bytes.toString('utf8'))).toMatchObject({ stamp: STAMP });
    visitor.expectNoComplaints();
  });

  it('sees the stamp in the list too, and none on the pooled fit', async () => {
    await goTo(page, 'records');
    await heading(page, '2 analyses are recorded').waitFor();
    const rows = page.getByRole('row');
    expect(await rows.filter({ hasText: 'ordinary line' }).textContent()).toContain(STAMP);
    expect(await rows.filter({ hasText: 'pooled line' }).textContent()).not.toContain(STAMP);
    await expectNoAxeViolations(page);
    visitor.expectNoComplaints();
  });
});

/**
 * In a masked study no arm reaches whoever is masked: not on a page, not in an answer under it, not in a file.
 * The only place of arm names is the owner's set-up, because they stand in the protocol.
 */
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import harrowFen from '../../seeds-demo/harrow-fen/setup.json' with { type: 'json' };
import type { DemoRole } from '../../seeds-demo/people.ts';
import { words } from '../../web/words/en.ts';
import {
  choose,
  chooseStudy,
  downloaded,
  enter,
  goTo,
  heading,
  placeLinks,
  type Running,
  STUDIES,
  settled,
  startDemo,
} from './steps.ts';

const MASKED: readonly DemoRole[] = [
  'coordinator',
  'monitor',
  'analyst',
  'owner',
  'safety officer',
];
const { check, cuts, records, imports } = words;

interface Heard {
  where: string;
  text: string;
}

let running: Running;
beforeAll(async () => {
  running = await startDemo();
});
afterAll(() => running?.close());

/** Every answer of the API to this page, as it came; a stream of progress has no end to wait for. */
function listen(page: Page): { all(): Promise<Heard[]> } {
  const answers: Promise<Heard>[] = [];
  page.on('response', (response) => {
    const where = new URL(response.url()).pathname;
    if (!where.startsWith('/api/') || response.request().resourceType() === 'eventsource') return;
    const body = response.status() === 204 ? Promise.resolve('') : response.text();
    answers.push(
      body.then((text) => ({ where, text: `${text} ${headersOf(response.headers())}` })),
    );
  });
  return { all: () => Promise.all(answers) };
}

const headersOf = (headers: Record<string, string>) => JSON.stringify(headers);

/** Text, titles and labels: all that a page says, seen or not. */
async function said(page: Page): Promise<Heard> {
  await settled(page);
  return { where: new URL(page.url()).pathname, text: await page.content() };
}

function withArm(heard: readonly Heard[], names: readonly string[]): string[] {
  return heard
    .filter(({ text }) => names.some((name) => text.toLowerCase().includes(name.toLowerCase())))
    .map(({ where }) => where);
}

/** Opens the first row of the place's table. */
async function openFirst(page: Page): Promise<void> {
  const before = page.url();
  await page.getByRole('table').getByRole('row').nth(1).getByRole('link').first().click();
  await page.waitForURL((url) => url.href !== before);
}

/** Each place of this person, what opens from it, and the files to be had there. */
async function walk(page: Page): Promise<Heard[]> {
  const heard: Heard[] = [await said(page)];
  const files = async (button: string) => {
    const { name, bytes } = await downloaded(
      page,
      page.getByRole('button', { name: button }).first(),
    );
    heard.push({ where: name, text: `${name} ${bytes.toString('utf8')}` });
  };
  const places = await placeLinks(page).allTextContents();
  const has = (place: string) => places.includes(place);
  if (has('Subjects')) {
    await goTo(page, 'subjects');
    await files(words.table.exportCsv);
    heard.push(await said(page));
    await openFirst(page);
    await page.getByRole('heading', { name: words.subjects.visits }).waitFor();
    await files(words.table.exportCsv);
    heard.push(await said(page));
  }
  if (has('Import')) {
    await goTo(page, 'import');
    heard.push(await said(page));
  }
  if (has('Cuts')) {
    await goTo(page, 'cuts');
    heard.push(await said(page));
    await openFirst(page);
    await files(cuts.download);
    heard.push(await said(page));
  }
  if (has('Check')) {
    await goTo(page, 'check');
    await choose(page, words.analysis.measureLabel, 'Sway path');
    expect(await page.getByText(words.analysis.groupLabel).count()).toBe(0);
    await page.getByRole('button', { name: check.open }).click();
    await heading(page, /independent observations$/).waitFor();
    heard.push(await said(page));
  }
  if (has('Records')) {
    await goTo(page, 'records');
    heard.push(await said(page));
    await openFirst(page);
    await page.getByRole('heading', { name: records.factsHeading }).waitFor();
    await files(records.download);
    heard.push(await said(page));
  }
  if (has('Members')) {
    await goTo(page, 'members');
    heard.push(await said(page));
  }
  return heard;
}

describe('in the masked study', () => {
  it('the allocation is there, so there is something to be silent about', async () => {
    const [sealed] = await running.app.database.query(
      `SELECT (SELECT count(*) > 80 FROM sealed.allocation) AS allocated,
              (SELECT array_agg(a.name ORDER BY a.name) FROM arm a JOIN study s ON s.id = a.study_id WHERE s.short_name = 'harrow-fen') AS arms`,
    );
    expect(sealed).toEqual({ allocated: true, arms: [...harrowFen.arms].sort() });
  });

  it.each(MASKED)('the %s meets no arm on any page, in any answer or file', async (role) => {
    const visitor = await enter(running, role);
    const answers = listen(visitor.page);
    await chooseStudy(visitor.page, STUDIES.masked);
    const heard = [...(await walk(visitor.page)), ...(await answers.all())];
    expect(withArm(heard, harrowFen.arms)).toEqual([]);
    if (role !== 'safety officer') expect(heard.length).toBeGreaterThan(4);
    visitor.expectNoComplaints();
    await visitor.context.close();
  });

  it('the owner reads arm names in the set-up, as the protocol has them, and beside nothing', async () => {
    const visitor = await enter(running, 'owner', STUDIES.masked);
    const answers = listen(visitor.page);
    await goTo(visitor.page, 'setup');
    for (const arm of harrowFen.arms) await visitor.page.getByText(arm).first().waitFor();
    // This also shows that the ear of the test before hears an arm where there is one.
    const told = withArm(await answers.all(), harrowFen.arms);
    expect(told.length).toBeGreaterThan(0);
    expect(told.every((where) => where.endsWith('/setup'))).toBe(true);
    const rows = visitor.page.getByRole('listitem');
    for (const arm of harrowFen.arms) expect(await rows.allTextContents()).toContain(arm);
    await visitor.context.close();
  });

  it('a file with a column of arm names is refused by the name of the column', async () => {
    const visitor = await enter(running, 'coordinator', STUDIES.masked);
    const { page } = visitor;
    await goTo(page, 'import');
    await choose(page, imports.measure, 'Sway path');
    const rows = harrowFen.arms.map((arm, index) => `ALD-00${index + 1},28,2${index},${arm}`);
    await page.getByLabel(imports.file, { exact: true }).setInputFiles({
      name: 'with-groups.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from(['subject,day,sway,routine', ...rows, ''].join('\n')),
    });
    await page.getByRole('button', { name: imports.upload }).click();
    await page
      .getByRole('alert')
      .getByText(/^Column “routine” holds arm names of this masked study\. Nothing was stored\./)
      .waitFor();
    const [kept] = await running.app.database.query(
      `SELECT count(*)::int AS imports FROM import WHERE file_name = 'with-groups.csv'`,
    );
    expect(kept).toEqual({ imports: 0 });
    visitor.expectNoComplaints(['400', '422']);
    await visitor.context.close();
  });
});

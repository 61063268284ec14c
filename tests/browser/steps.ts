/** What people do on the pages, shared by the browser tests: sign in, choose a study, go to a place, fill a form. */
import { readFile } from 'node:fs/promises';
import type { Locator, Page, Request } from 'playwright-core';
import { inject } from 'vitest';
import type { Place } from '../../api/contracts/auth.ts';
import type { DemoRole } from '../../seeds-demo/people.ts';
import { words } from '../../web/words/en.ts';
import {
  launchBrowser,
  type OpenOptions,
  type TestBrowser,
  type TestPage,
} from '../support/browser.ts';
import { signInAs } from '../support/sign-in-as.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';

export const STUDIES = {
  masked: 'Harrow Fen balance study',
  open: 'Mill Lane walking groups',
  empty: 'Reaction time, ten days',
} as const;

/** Two busy cores also serve other work: what is slow is not yet broken. */
const PATIENCE_MS = 30_000;

export interface Running {
  app: TestApp;
  browser: TestBrowser;
  close(): Promise<void>;
}

/** The demo, served as people get it, with a browser in front of it. */
export async function startDemo(): Promise<Running> {
  const app = await startTestApp({
    demo: true,
    listen: true,
    realClock: true,
    work: true,
    webRoot: inject('webFolder'),
  });
  try {
    const browser = await launchBrowser();
    return {
      app,
      browser,
      close: async () => {
        await browser.close();
        await app.close();
      },
    };
  } catch (error) {
    await app.close();
    throw error;
  }
}

/** A fresh visitor who has signed in, and has chosen the study where one is named. */
export async function enter(
  { app, browser }: Running,
  role: DemoRole,
  study?: string,
  options?: OpenOptions,
): Promise<TestPage> {
  const visitor = await browser.open(app.address, options);
  visitor.context.setDefaultTimeout(PATIENCE_MS);
  watch(visitor.page);
  await signInAs(visitor, role);
  if (study) await chooseStudy(visitor.page, study);
  return visitor;
}

/** From the start page; who belongs to one study only is there already. */
export async function chooseStudy(page: Page, study: string): Promise<void> {
  const inStudy = heading(page, STUDY_HEADING);
  await heading(page, words.home.chooseHeading).or(inStudy).waitFor();
  if (!(await inStudy.isVisible())) await page.getByRole('link', { name: study }).click();
  await inStudy.waitFor();
}

/** "You coordinate this study", "You are the safety officer of this study". */
const STUDY_HEADING = /^You .+ this study$/;

export function heading(page: Page, name: string | RegExp): Locator {
  return page.getByRole('heading', { level: 1, name });
}

/** What stands on top of each place once its data have come. */
const PLACE_HEADINGS: Readonly<Record<Place, string | RegExp>> = {
  subjects: words.subjects.heading,
  import: words.imports.heading,
  cuts: /frozen/,
  check: /check|independent/i,
  records: /recorded/,
  members: words.members.heading,
  setup: words.setup.heading,
  accounts: words.accounts.heading,
  'security-log': words.security.heading,
};

/** By the row of places under the top bar. */
export async function goTo(page: Page, place: Place): Promise<void> {
  await placeLinks(page).filter({ hasText: words.places[place] }).first().click();
  await heading(page, PLACE_HEADINGS[place]).waitFor();
  await settled(page);
}

export function placeLinks(page: Page): Locator {
  return page.getByRole('navigation', { name: words.topBar.places }).getByRole('link');
}

/** Requests that each page waits for; a stream of progress never ends, so it is none of them. */
const waitedFor = new WeakMap<Page, Set<Request>>();

function watch(page: Page): void {
  const open = new Set<Request>();
  waitedFor.set(page, open);
  page.on('request', (request) => {
    // A new document leaves the requests of the old one behind, finished or not.
    if (request.isNavigationRequest()) open.clear();
    if (request.resourceType() !== 'eventsource') open.add(request);
  });
  page.on('requestfinished', (request) => open.delete(request));
  page.on('requestfailed', (request) => open.delete(request));
}

/** Nothing is still being read: no request is open, and none is begun by what the last ones brought. */
export async function settled(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1 }).waitFor();
  const open = waitedFor.get(page);
  if (!open) throw new Error('only pages of enter() are watched');
  const until = Date.now() + PATIENCE_MS;
  for (let quiet = 0; quiet < 3; ) {
    await page.evaluate(
      () => new Promise<void>((drawn) => requestIdleCallback(() => drawn(), { timeout: 500 })),
    );
    quiet = open.size === 0 ? quiet + 1 : 0;
    if (Date.now() > until)
      throw new Error(`still open: ${[...open].map((request) => request.url()).join(' ')}`);
  }
  await page.evaluate(() => document.fonts.ready.then(() => null));
}

/** Opens a list of choices by its label and takes one. */
export async function choose(page: Page, label: string, option: string): Promise<void> {
  await page
    .getByRole('button', { name: label })
    .and(page.locator('[aria-haspopup=listbox]'))
    .click();
  await page.getByRole('option', { name: option }).click();
  await page.getByRole('listbox').waitFor({ state: 'detached' });
}

/** Takes one of the choices that stand side by side; a note may follow its words. */
export async function tick(within: Page | Locator, option: string): Promise<void> {
  await within
    .locator('label')
    .filter({ hasText: new RegExp(`^${option}`) })
    .first()
    .click();
}

/** Does the act and reads the file that the browser is given for it. */
export async function downloaded(
  page: Page,
  act: Locator,
): Promise<{ name: string; bytes: Buffer }> {
  const [download] = await Promise.all([page.waitForEvent('download'), act.click()]);
  return {
    name: download.suggestedFilename(),
    bytes: await readFile(await download.path()),
  };
}

/** A day before today, as date fields hold it. */
export function daysAgo(days: number): string {
  return new Date(Date.now() - days * 86_400_000).toISOString().slice(0, 10);
}

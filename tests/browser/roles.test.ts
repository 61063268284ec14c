/** Each of the eight roles signs in and meets the places of its duty, each of them whole in every theme and width. */
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Place } from '../../api/contracts/auth.ts';
import type { DemoRole } from '../../seeds-demo/people.ts';
import { words } from '../../web/words/en.ts';
import { expectNoAxeViolations, type TestPage } from '../support/browser.ts';
import {
  choose,
  enter,
  goTo,
  heading,
  placeLinks,
  type Running,
  STUDIES,
  settled,
  startDemo,
} from './steps.ts';

const PLACES: Readonly<Record<DemoRole, readonly Place[]>> = {
  owner: ['members', 'setup', 'subjects', 'cuts', 'records'],
  coordinator: ['subjects', 'import'],
  monitor: ['subjects'],
  analyst: ['cuts', 'check', 'records'],
  'unblinded statistician': [],
  'board member': [],
  'safety officer': [],
  administrator: ['accounts', 'security-log'],
};
/** What opens from a place: the first row of its table, or an act beside it. */
const OPENS: Partial<Record<Place, (page: Page) => Promise<void>>> = {
  subjects: async (page) => {
    await firstRow(page);
    await page.getByRole('heading', { name: words.subjects.visits }).waitFor();
  },
  import: async (page) => {
    await firstRow(page);
    await heading(page, words.imports.appliedHeading).waitFor();
  },
  cuts: async (page) => {
    await firstRow(page);
    await page.getByText(words.cuts.hash).waitFor();
  },
  check: async (page) => {
    await choose(page, words.analysis.measureLabel, 'Sway path');
    await page.getByRole('button', { name: words.check.open }).click();
    await heading(page, /independent observations$/).waitFor();
  },
  records: async (page) => {
    await firstRow(page);
    await page.getByRole('heading', { name: words.records.factsHeading }).waitFor();
  },
};
/** Who has no place yet is told why, in words. */
const NOTHING_YET: Partial<Record<DemoRole, string>> = words.home.roles;
const WIDE = { width: 1280, height: 800 };
const LOOKS = (['light', 'dark'] as const).flatMap((theme) => [
  { theme, ...WIDE },
  { theme, width: 768, height: 1024 },
]);

/** Two pages, each read by axe four times: half a minute on a quiet machine. */
const SLOW_MS = 300_000;

let running: Running;
beforeAll(async () => {
  running = await startDemo();
});
afterAll(() => running?.close());

async function firstRow(page: Page): Promise<void> {
  await page.getByRole('table').getByRole('row').nth(1).getByRole('link').first().click();
}

/** The page as it stands, in both themes and on a desk, on a tablet and on a telephone. */
async function expectWhole({ page, expectNoComplaints }: TestPage): Promise<void> {
  await settled(page);
  for (const { theme, width, height } of LOOKS) {
    await page.emulateMedia({ colorScheme: theme });
    await page.setViewportSize({ width, height });
    await page.waitForFunction((shown) => document.documentElement.dataset.theme === shown, theme);
    await settled(page);
    await expectNoSidewaysScrolling(page);
    await expectNoAxeViolations(page);
  }
  await page.setViewportSize({ width: 360, height: 780 });
  await settled(page);
  await expectNoSidewaysScrolling(page);
  await page.emulateMedia({ colorScheme: 'light' });
  await page.setViewportSize(WIDE);
  expectNoComplaints();
}

async function expectNoSidewaysScrolling(page: Page): Promise<void> {
  const { wide, room } = await page.evaluate(() => ({
    wide: document.documentElement.scrollWidth,
    room: document.documentElement.clientWidth,
  }));
  expect(wide, `${page.url()} at ${room} px`).toBeLessThanOrEqual(room);
}

describe.each(Object.entries(PLACES) as [DemoRole, readonly Place[]][])(
  'the %s',
  (role, places) => {
    let visitor: TestPage;
    beforeAll(async () => {
      visitor = await enter(running, role, role === 'administrator' ? undefined : STUDIES.masked);
      await settled(visitor.page);
    });
    afterAll(() => visitor?.context.close());

    it('meets exactly the places of this duty', async () => {
      const { page } = visitor;
      if (role === 'administrator') await heading(page, words.home.administratorHeading).waitFor();
      expect(await placeLinks(page).allTextContents()).toEqual(
        places.map((place) => words.places[place]),
      );
      const nothing = NOTHING_YET[role];
      expect(nothing === undefined).toBe(places.length > 0);
      if (nothing) await page.getByText(nothing).waitFor();
      await expectWhole(visitor);
    });

    if (places.length > 0)
      it.each(places)(
        'opens %s, and what opens from it, without a fault',
        async (place) => {
          await goTo(visitor.page, place);
          await expectWhole(visitor);
          const open = OPENS[place];
          if (!open) return;
          await open(visitor.page);
          await expectWhole(visitor);
        },
        SLOW_MS,
      );
  },
);

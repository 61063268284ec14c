import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import axe from 'axe-core';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';
import { expect } from 'vitest';
import { findChromium } from './chromium.ts';

export interface TestBrowser {
  /** A fresh visitor, without cookies; what the page complains about is kept for `expectNoComplaints`. */
  open(address: string, options?: OpenOptions): Promise<TestPage>;
  close(): Promise<void>;
}

export interface OpenOptions {
  theme?: 'light' | 'dark';
  width?: number;
  height?: number;
  /** Whoever asks for less motion gets none; tests do by default, so that nothing is caught in between. */
  motion?: 'reduce' | 'no-preference';
}

export interface TestPage {
  page: Page;
  context: BrowserContext;
  /** Console errors, exceptions and refused resources since the last look. */
  complaints(): string[];
  /** Fails where the page has complained; `expected` are parts of complaints that belong to the test. */
  expectNoComplaints(expected?: readonly string[]): void;
}

/** One Chromium for a test file. Its home is a folder that goes with it, so that it never meets a person's own. */
export async function launchBrowser(): Promise<TestBrowser> {
  const executablePath = findChromium();
  if (executablePath === undefined) throw new Error('Chromium is missing: run npm test');
  const home = mkdtempSync(join(tmpdir(), 'tetherline-browser-'));
  const browser: Browser = await chromium.launch({
    executablePath,
    headless: true,
    args: ['--no-sandbox', '--disable-gpu', '--disable-dev-shm-usage'],
    env: { ...definedOnly(process.env), HOME: home, XDG_CONFIG_HOME: home, XDG_CACHE_HOME: home },
  });
  return {
    open: (address, options) => openPage(browser, address, options),
    close: async () => {
      await browser.close();
      rmSync(home, { recursive: true, force: true, maxRetries: 5 });
    },
  };
}

async function openPage(
  browser: Browser,
  address: string,
  options: OpenOptions = {},
): Promise<TestPage> {
  const context = await browser.newContext({
    baseURL: address,
    viewport: { width: options.width ?? 1280, height: options.height ?? 800 },
    colorScheme: options.theme ?? 'light',
    reducedMotion: options.motion ?? 'reduce',
    locale: 'en-GB',
    timezoneId: 'Europe/London',
    acceptDownloads: true,
  });
  context.setDefaultTimeout(60_000);
  const page = await context.newPage();
  let heard: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') heard.push(`${message.text()} (${message.location().url})`);
  });
  page.on('pageerror', (error) => heard.push(String(error)));
  const complaints = () => {
    const since = heard;
    heard = [];
    return since;
  };
  return {
    page,
    context,
    complaints,
    expectNoComplaints(expected = []) {
      const strange = complaints().filter(
        (complaint) => !expected.some((part) => complaint.includes(part)),
      );
      expect(strange).toEqual([]);
    },
  };
}

interface AxeFinding {
  id: string;
  nodes: { target: unknown[]; failureSummary?: string }[];
}

/** Every rule of axe for WCAG 2.2 AA and good practice, on the page as it stands. */
export async function expectNoAxeViolations(page: Page): Promise<void> {
  await page.evaluate(axe.source);
  const findings = (await page.evaluate(async () => {
    const { axe } = window as unknown as {
      axe: { run(): Promise<{ violations: AxeFinding[] }> };
    };
    const { violations } = await axe.run();
    return violations.map(({ id, nodes }) => ({
      id,
      nodes: nodes.map(({ target, failureSummary }) => ({ target, failureSummary })),
    }));
  })) as AxeFinding[];
  const lines = findings.flatMap(({ id, nodes }) =>
    nodes.map(({ target, failureSummary }) => `${id} at ${String(target)}: ${failureSummary}`),
  );
  expect(lines, `axe on ${page.url()}`).toEqual([]);
}

function definedOnly(env: NodeJS.ProcessEnv): Record<string, string> {
  return Object.fromEntries(
    Object.entries(env).filter((entry): entry is [string, string] => entry[1] !== undefined),
  );
}

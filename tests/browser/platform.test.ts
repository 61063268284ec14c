import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { demoPeople } from '../../seeds-demo/people.ts';
import { expectNoAxeViolations, launchBrowser, type TestBrowser } from '../support/browser.ts';
import { signInAs } from '../support/sign-in-as.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';

describe('the built pages over the demo', () => {
  let running: TestApp;
  let browser: TestBrowser;
  beforeAll(async () => {
    running = await startTestApp({
      demo: true,
      listen: true,
      realClock: true,
      work: true,
      webRoot: inject('webFolder'),
    });
    browser = await launchBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await running?.close();
  });

  it.each(['light', 'dark'] as const)(
    'ask a stranger to sign in, in the %s theme, without a fault',
    async (theme) => {
      const visitor = await browser.open(running.address, { theme });
      await visitor.page.goto('/');
      await visitor.page.getByRole('heading', { level: 1 }).waitFor();
      expect(new URL(visitor.page.url()).pathname).toBe('/sign-in');
      await expectNoAxeViolations(visitor.page);
      // The question whether somebody is signed in is answered by 401, which the browser writes down.
      visitor.expectNoComplaints(['401']);
      await visitor.context.close();
    },
  );

  it.each(demoPeople.map((person) => person.role))(
    'open for the %s without a fault',
    async (role) => {
      const visitor = await browser.open(running.address);
      await signInAs(visitor, role);
      await visitor.page.getByRole('main').waitFor();
      await visitor.page.waitForLoadState('networkidle');
      await visitor.page.getByRole('heading', { level: 1 }).waitFor();
      expect(new URL(visitor.page.url()).pathname).not.toBe('/sign-in');
      await expectNoAxeViolations(visitor.page);
      visitor.expectNoComplaints();
      await visitor.context.close();
    },
  );
});

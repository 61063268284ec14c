import { type DemoRole, demoPeople } from '../../seeds-demo/people.ts';
import type { TestPage } from './browser.ts';

/**
 * Signs the visitor in as the demo's person with this role, through the form: the page keeps things of its
 * own about a session, which the cookies alone would not bring.
 */
export async function signInAs(visitor: TestPage, role: DemoRole): Promise<void> {
  const person = demoPeople.find((candidate) => candidate.role === role);
  if (!person) throw new Error(`the demo has no ${role}`);
  const { page } = visitor;
  await page.goto('/sign-in');
  await page.locator('input[type=email]').fill(person.email);
  await page.locator('input[type=password]').fill(person.password);
  await page.keyboard.press('Enter');
  await page.waitForURL((url) => url.pathname !== '/sign-in');
  // A stranger's first question is answered by 401, which the browser writes down; it ends here.
  visitor.expectNoComplaints(['401']);
}

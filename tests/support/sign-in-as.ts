import { type DemoRole, demoPeople } from '../../seeds-demo/people.ts';
import type { TestPage } from './browser.ts';

/** Gives the visitor the session of the demo's person with this role; the sign-in page has tests of its own. */
export async function signInAs(visitor: TestPage, role: DemoRole): Promise<void> {
  const person = demoPeople.find((candidate) => candidate.role === role);
  if (!person) throw new Error(`the demo has no ${role}`);
  const { email, password } = person;
  const answer = await visitor.context.request.post('/api/sign-in', { data: { email, password } });
  if (!answer.ok())
    throw new Error(`${role} was refused: ${answer.status()} ${await answer.text()}`);
}

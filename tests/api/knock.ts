/** Asking to be let in, and what the answer carries in its cookies. */
import type { Response } from 'supertest';
import type TestAgent from 'supertest/lib/agent.js';

export const knock = (agent: TestAgent, email: string, password: string) =>
  agent.post('/api/sign-in').send({ email, password });

/** The whole cookie with its attributes; empty where the answer sets none of that name. */
export function cookieOf(answer: Response, name: string): string {
  const cookies = (answer.headers['set-cookie'] ?? []) as unknown as string[];
  return cookies.find((cookie) => cookie.startsWith(`${name}=`)) ?? '';
}

/** Name and value, as a browser sends them back. */
export const pairOf = (cookie: string): string => cookie.split(';')[0] ?? '';

/** Sends a letter and keeps of it what the outbox shows: to whom, of what kind, in which state. */
import { type Account, Letter } from '../../../database/entities/index.ts';
import type { AppDeps } from '../../http/deps.ts';
import { type LetterKind, letterWords } from '../../words/account-letters.ts';

/** Called after the change is kept: a mail server that is down undoes nothing. @returns whether it was sent */
export async function sendLetter(
  deps: Pick<AppDeps, 'databases' | 'mailer' | 'config' | 'clock'>,
  account: Pick<Account, 'id' | 'email' | 'name'>,
  kind: LetterKind,
): Promise<boolean> {
  if (!deps.mailer.configured) return false;
  const letters = deps.databases.masked.getRepository(Letter);
  const letter = await letters.save({
    toAccount: account.id,
    kind,
    state: 'waiting' as const,
    createdAt: deps.clock(),
    sentAt: null,
  });
  const words = letterWords(kind, account.name, deps.config.publicUrl);
  const state = await deps.mailer.sendLetter({ to: account.email, kind, ...words });
  const sent = state === 'sent';
  await letters.update(
    { id: letter.id },
    { state: sent ? 'sent' : 'failed', sentAt: sent ? deps.clock() : null },
  );
  return sent;
}

import { createTransport } from 'nodemailer';

/** A letter to one person. It never carries a password, a reading or an arm. */
export interface Letter {
  to: string;
  /** What the outbox shows instead of the content, such as `account created`. */
  kind: string;
  subject: string;
  /** Plain text. */
  text: string;
}

export type LetterState = 'sent' | 'failed' | 'no mail server';

export interface Mailer {
  /** False where letters can't be sent, so that pages may say so beforehand. */
  readonly configured: boolean;
  /** Never throws: a mail server that is down must not undo what the letter tells about. */
  sendLetter(letter: Letter): Promise<LetterState>;
  close(): void;
}

/** How long one try at a mail server may take. */
const PATIENCE_MS = 15_000;

/**
 * @param onFailure hears why a letter could not be sent; the reason may name the mail server, never the content
 */
export function openMailer(
  settings: { smtpUrl: string | undefined; from: string },
  onFailure: (kind: string, reason: string) => void,
): Mailer {
  if (settings.smtpUrl === undefined) {
    return {
      configured: false,
      sendLetter: () => Promise.resolve('no mail server'),
      close: () => undefined,
    };
  }
  const transport = createTransport({
    url: settings.smtpUrl,
    connectionTimeout: PATIENCE_MS,
    greetingTimeout: PATIENCE_MS,
    socketTimeout: PATIENCE_MS,
  });
  return {
    configured: true,
    async sendLetter(letter) {
      try {
        await transport.sendMail({
          from: settings.from,
          // As an object, the address is one recipient whatever commas or brackets it holds.
          to: { name: '', address: letter.to },
          subject: letter.subject,
          text: letter.text,
          textEncoding: 'base64',
          headers: { 'X-Letter-Kind': letter.kind, 'Auto-Submitted': 'auto-generated' },
          disableFileAccess: true,
          disableUrlAccess: true,
        });
        return 'sent';
      } catch (error) {
        onFailure(letter.kind, (error as { code?: string }).code ?? 'unknown');
        return 'failed';
      }
    },
    close: () => transport.close(),
  };
}

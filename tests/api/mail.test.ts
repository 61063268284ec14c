import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import express from 'express';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { lettersPage } from '../../api/mail/letters-page.ts';
import { type Mailer, openMailer } from '../../api/mail/mailer.ts';
import { type MailSink, startSink } from '../../api/mail/sink.ts';

const FROM = 'Tetherline <tetherline@localhost>';
const unexpected = (kind: string, reason: string) => {
  throw new Error(`${kind}: ${reason}`);
};

describe('letters', () => {
  let folder: string;
  let sink: MailSink;
  let mailer: Mailer;
  let minute = 0;

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'tetherline-letters-'));
    sink = await startSink(folder, () => {
      minute += 1;
      return new Date(Date.UTC(2026, 11, 1, 9, minute));
    });
    mailer = openMailer({ smtpUrl: sink.smtpUrl, from: FROM }, unexpected);
  });
  afterAll(async () => {
    mailer.close();
    await sink.close();
    await rm(folder, { recursive: true, force: true });
  });

  it('arrive in the sink as they were written, newest first', async () => {
    const text = 'An account was made for you.\n\nÉtude — naïve ≥ 5';
    await mailer.sendLetter({ to: 'ann@a.example', kind: 'account created', subject: 'One', text });
    const second = {
      kind: 'account reset',
      subject: 'Zwölf lange Wörter — für größere Köpfe, übermorgen und später',
      text,
    };
    expect(await mailer.sendLetter({ to: 'bea@a.example', ...second })).toBe('sent');
    expect(await sink.letters()).toEqual([
      { at: '2026-12-01T09:02:00.000Z', to: 'bea@a.example', ...second },
      {
        at: '2026-12-01T09:01:00.000Z',
        to: 'ann@a.example',
        kind: 'account created',
        subject: 'One',
        text,
      },
    ]);
  });

  it('go to nobody when an address holds two', async () => {
    const before = await sink.letters();
    const careful = openMailer({ smtpUrl: sink.smtpUrl, from: FROM }, () => undefined);
    const letter = { to: 'x@a.example, y@b.example', kind: 'k', subject: 's', text: 't' };
    expect(await careful.sendLetter(letter)).toBe('failed');
    expect(await sink.letters()).toEqual(before);
    careful.close();
  });

  it('fail without an exception when the mail server is down, and are not sent when there is none', async () => {
    const heard: string[] = [];
    const down = openMailer({ smtpUrl: 'smtp://127.0.0.1:1', from: FROM }, (kind, reason) =>
      heard.push(`${kind} ${reason}`),
    );
    const letter = { to: 'a@a.example', kind: 'account reset', subject: 's', text: 't' };
    expect(await down.sendLetter(letter)).toBe('failed');
    expect(heard).toEqual(['account reset ESOCKET']);
    const none = openMailer({ smtpUrl: undefined, from: FROM }, unexpected);
    expect(none.configured).toBe(false);
    expect(await none.sendLetter(letter)).toBe('no mail server');
  });

  it('are shown as text on a page for this machine alone', async () => {
    await mailer.sendLetter({
      to: 'eve@a.example',
      kind: 'k',
      subject: '<script>alert(1)</script>',
      text: '<b>bold</b>',
    });
    const app = express().use('/demo/letters', lettersPage(sink));
    const page = await request(app).get('/demo/letters').set('Host', '127.0.0.1');
    expect(page.status).toBe(200);
    expect(page.text).toContain('&lt;script&gt;alert(1)');
    expect(page.text).not.toContain('<b>bold');
    expect((await request(app).get('/demo/letters').set('Host', 'evil.example')).status).toBe(404);
    const forwarded = request(app).get('/demo/letters').set('Host', 'localhost');
    expect((await forwarded.set('X-Forwarded-For', '203.0.113.9')).status).toBe(404);
  });
});

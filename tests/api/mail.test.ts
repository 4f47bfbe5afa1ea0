import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Writable } from 'node:stream';
import { simpleParser } from 'mailparser';
import { pino } from 'pino';
import { afterAll, expect, it } from 'vitest';
import { type MailSink, startMailSink } from '../../server/mail/mail-sink.js';
import { smtpMailer } from '../../server/mail/mailer.js';
import { text } from '../../shared/text.js';

const folder = mkdtempSync(join(tmpdir(), 'hummock-mail-'));
const lines: string[] = [];
const log = new Writable({
  write(chunk, _encoding, done) {
    lines.push(String(chunk));
    done();
  },
});
const sink: MailSink = await startMailSink(join(folder, 'mail'), pino({ base: null }, log));
const mailer = smtpMailer(sink.smtpUrl, 'Hummock <hummock@localhost>', text.mail.foot);
afterAll(async () => {
  mailer.close();
  await sink.close();
  rmSync(folder, { recursive: true, force: true });
});

const link = `http://127.0.0.1:4680/verify/${'a-long-code-'.repeat(8)}`;
const letter = {
  to: 'ada@example.test',
  subject: text.mail.verify.subject,
  lead: text.mail.verify.lead('Ada Ωberg'),
  body: text.mail.verify.body,
  why: text.mail.verify.why,
  link,
};

it('carries a letter over SMTP into a file that only this user reads, and prints its link', async () => {
  await mailer.send(letter);
  const [name] = readdirSync(join(folder, 'mail'));
  const path = join(folder, 'mail', name!);
  expect(name).toMatch(/^\d{4}-\d\d-\d\dT.*-1-ada@example\.test\.eml$/);
  expect(statSync(path).mode & 0o077).toBe(0);
  const parsed = await simpleParser(readFileSync(path));
  expect(parsed.subject).toBe(letter.subject);
  expect(parsed.html).toBe(false); // a plain-text part alone
  const body = parsed.text ?? '';
  for (const part of [letter.lead, letter.body, letter.why, text.mail.foot]) expect(body).toContain(part);
  expect(body.match(/https?:\/\/\S+/g)).toEqual([link]); // one action
  expect(lines.map((line) => JSON.parse(line))).toContainEqual(
    expect.objectContaining({ event: 'letter', to: 'ada@example.test', link, path }),
  );
});

it('keeps an address from adding recipients or headers of its own', async () => {
  const before = readdirSync(join(folder, 'mail')).length;
  await mailer
    .send({ ...letter, to: 'eve@example.test\r\nBcc: everyone@example.test', subject: 'A\r\nX-Forged: yes' })
    .catch(() => undefined); // refusing it is as good
  for (const name of readdirSync(join(folder, 'mail')).slice(before)) {
    const raw = readFileSync(join(folder, 'mail', name), 'utf8');
    expect(raw).not.toMatch(/^(X-Forged|Bcc):/m);
  }
});

it('says so when the server of the mail does not answer', async () => {
  const nobody = smtpMailer('smtp://127.0.0.1:1', 'Hummock <hummock@localhost>', '');
  await expect(nobody.send(letter)).rejects.toThrow();
  nobody.close();
});

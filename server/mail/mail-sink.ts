import { mkdir, writeFile } from 'node:fs/promises';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import type { Readable } from 'node:stream';
import { simpleParser } from 'mailparser';
import type { Logger } from 'pino';
import { SMTPServer } from 'smtp-server';

export interface MailSink {
  readonly smtpUrl: string;
  close(): Promise<void>;
}

/**
 * An SMTP server on loopback that sends nothing on: every letter is kept as a file, and its link stands in the log, so
 * that an installation without mail can be used by whoever sees its console.
 */
export async function startMailSink(folder: string, logger: Logger): Promise<MailSink> {
  await mkdir(folder, { recursive: true, mode: 0o700 });
  let count = 0;
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: 1_000_000,
    onData(stream, _session, done) {
      count += 1;
      keep(stream, folder, count, logger).then(() => done(), done);
    },
  });
  server.on('error', (error) => logger.error({ err: error, part: 'mail' }, 'the local mail sink'));
  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject);
    server.listen(0, '127.0.0.1', resolve);
  });
  const { port } = server.server.address() as AddressInfo;
  return {
    smtpUrl: `smtp://127.0.0.1:${port}`,
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}

async function keep(stream: Readable, folder: string, count: number, logger: Logger): Promise<void> {
  const parts: Buffer[] = [];
  for await (const part of stream) parts.push(part as Buffer);
  const raw = Buffer.concat(parts);
  const letter = await simpleParser(raw);
  const recipient = [letter.to ?? []].flat().flatMap((to) => to.value)[0]?.address ?? 'nobody';
  const time = new Date().toISOString().replace(/[:.]/g, '-');
  const path = join(folder, `${time}-${count}-${recipient.replace(/[^\w.@+-]/g, '_')}.eml`);
  await writeFile(path, raw, { mode: 0o600 });
  const link = /https?:\/\/\S+/.exec(letter.text ?? '')?.[0];
  logger.info({ event: 'letter', to: recipient, subject: letter.subject, link, path }, 'a letter was kept');
}

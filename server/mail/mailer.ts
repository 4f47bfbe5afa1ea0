import { createTransport } from 'nodemailer';

/** A letter: plain text with one action, and why it was sent. */
export interface Letter {
  readonly to: string;
  readonly subject: string;
  readonly lead: string;
  readonly body: string;
  readonly link: string;
  readonly why: string;
}

export interface Mailer {
  send(letter: Letter): Promise<void>;
  close(): void;
}

/** Sends by SMTP, to a real server or to the local sink alike. */
export function smtpMailer(smtpUrl: string, from: string, foot: string): Mailer {
  const transport = createTransport(smtpUrl);
  return {
    async send({ to, subject, lead, body, link, why }) {
      const text = [lead, '', body, '', link, '', why, '', '-- ', foot, ''].join('\n');
      await transport.sendMail({
        from,
        to: { name: '', address: to },
        subject,
        text,
        headers: { 'Auto-Submitted': 'auto-generated' },
      });
    },
    close: () => transport.close(),
  };
}

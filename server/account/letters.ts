import type { DataSource } from 'typeorm';
import { text } from '../../shared/text.js';
import { PersonEntity } from '../database/entities/person.entity.js';
import type { TaskPayloads } from '../jobs/jobs.js';
import type { Letter, Mailer } from '../mail/mailer.js';
import { newCode } from './mail-codes.js';

/**
 * Writes the letter that was asked for, if the address is known. The code is made here, when the letter leaves: it
 * never stands in the queue.
 */
export class AccountLetters {
  constructor(
    private readonly dataSource: DataSource,
    private readonly mailer: Mailer,
    private readonly publicUrl: () => string,
    private readonly now: () => Date,
  ) {}

  async send({ kind, email }: TaskPayloads['send-letter']): Promise<void> {
    const person = await this.dataSource.manager.findOneBy(PersonEntity, { email });
    if (!person || person.deletedAt || (kind === 'verify' && person.verifiedAt)) return;
    await this.mailer.send(await this.letter(kind, person));
  }

  private async letter(kind: TaskPayloads['send-letter']['kind'], person: PersonEntity): Promise<Letter> {
    if (kind === 'reset') return this.written(person, text.mail.reset, `/reset/${await this.code(person, 'reset')}`);
    if (!person.verifiedAt)
      return this.written(person, text.mail.verify, `/verify/${await this.code(person, 'verify')}`);
    return this.written(person, text.mail.knownAddress, '/sign-in');
  }

  private code(person: PersonEntity, purpose: 'verify' | 'reset'): Promise<string> {
    return this.dataSource.transaction((manager) => newCode(manager, person.id, purpose, this.now()));
  }

  private written(
    person: PersonEntity,
    words: { subject: string; lead: (name: string) => string; body: string; why: string },
    path: string,
  ): Letter {
    const { subject, body, why } = words;
    return { to: person.email, subject, lead: words.lead(person.name), body, why, link: `${this.publicUrl()}${path}` };
  }
}

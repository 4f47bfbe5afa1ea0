import { createHash, randomBytes } from 'node:crypto';
import { type EntityManager, IsNull, MoreThan } from 'typeorm';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { MailCodeEntity } from '../database/entities/mail-code.entity.js';

export type Purpose = MailCodeEntity['purpose'];
const LIFE_MS: Record<Purpose, number> = { verify: 48 * 3_600_000, reset: 3_600_000 };

function sha256(code: string): string {
  return createHash('sha256').update(code).digest('hex');
}

/** A new code of 256 random bits; the earlier ones of the same purpose no longer open anything. */
export async function newCode(manager: EntityManager, personId: string, purpose: Purpose, now: Date): Promise<string> {
  await voidCodes(manager, personId, purpose, now);
  const code = randomBytes(32).toString('base64url');
  const expiresAt = new Date(now.getTime() + LIFE_MS[purpose]);
  await manager.insert(MailCodeEntity, { personId, purpose, codeSha256: sha256(code), expiresAt, usedAt: null });
  return code;
}

/** Uses a code up and answers whose it is. Used, ended and unknown codes answer alike. */
export async function spendCode(manager: EntityManager, code: string, purpose: Purpose, now: Date): Promise<string> {
  const open = { codeSha256: sha256(code), purpose, usedAt: IsNull(), expiresAt: MoreThan(now) };
  const used = await manager
    .createQueryBuilder()
    .update(MailCodeEntity)
    .set({ usedAt: now })
    .where(open)
    .returning('person_id')
    .execute();
  const row = (used.raw as { person_id: string }[])[0];
  if (!row) throw new AppError('link-not-open', text.server.linkNotOpen);
  return row.person_id;
}

export async function voidCodes(manager: EntityManager, personId: string, purpose: Purpose, now: Date): Promise<void> {
  await manager.update(MailCodeEntity, { personId, purpose, usedAt: IsNull() }, { usedAt: now });
}

/** Letters that the local mail sink caught. */
import { desc, sql } from 'drizzle-orm';
import type { Id } from '../../lib/ids';
import type { Tx } from '../client';
import { newId } from '../ids';
import { capturedMail } from '../schema';

export const KEPT_LETTERS = 200;

export interface CapturedLetter {
  id: Id<'mail'>;
  to: string;
  from: string;
  subject: string;
  text: string;
  receivedAt: Date;
}

/** Stores a letter and forgets the oldest beyond KEPT_LETTERS. */
export async function captureLetter(
  tx: Tx,
  letter: { to: string; from: string; subject: string; text: string; html: string },
): Promise<void> {
  await tx.insert(capturedMail).values({ id: newId('mail'), ...letter });
  await tx
    .delete(capturedMail)
    .where(
      sql`${capturedMail.id} in (select id from captured_mail order by received_at desc, id desc offset ${KEPT_LETTERS})`,
    );
}

/** Newest first. */
export function listLetters(tx: Tx): Promise<CapturedLetter[]> {
  return tx
    .select({
      id: capturedMail.id,
      to: capturedMail.to,
      from: capturedMail.from,
      subject: capturedMail.subject,
      text: capturedMail.text,
      receivedAt: capturedMail.receivedAt,
    })
    .from(capturedMail)
    .orderBy(desc(capturedMail.receivedAt), desc(capturedMail.id))
    .limit(KEPT_LETTERS);
}

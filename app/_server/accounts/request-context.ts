/** The account context of the request that is being answered. */
import 'server-only';
import { database } from '@/db/client';
import { logIncident } from '../log';
import { type Letter, sendMail } from '../mail';
import { currentClient } from '../session';
import { publicUrl } from '../settings';
import type { AccountContext } from './context';

async function sendOrLog(letter: Letter): Promise<boolean> {
  try {
    await sendMail(letter);
    return true;
  } catch (error) {
    await logIncident(error, 'mail');
    return false;
  }
}

export async function accountContext(): Promise<AccountContext> {
  const { address } = await currentClient();
  return { db: database(), now: new Date(), address, send: sendOrLog, link: publicUrl };
}

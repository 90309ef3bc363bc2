/** The account context of the request that is being answered. */
import 'server-only';
import { database } from '@/db/client';
import { sendMail } from '../mail';
import { currentClient } from '../session';
import { publicUrl } from '../settings';
import type { AccountContext } from './context';

export async function accountContext(): Promise<AccountContext> {
  const { address } = await currentClient();
  return { db: database(), now: new Date(), address, send: sendMail, link: publicUrl };
}

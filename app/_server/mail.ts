/** Letters by SMTP. SMTP_URL names the server (the local mail sink in development); MAIL_FROM the sender. */
import 'server-only';
import { createTransport, type Transporter } from 'nodemailer';

export interface Letter {
  to: string;
  subject: string;
  text: string;
}

const shared = globalThis as { pinloomMail?: Transporter };

function transport(): Transporter {
  const url = process.env.SMTP_URL;
  if (!url) throw new Error('SMTP_URL is not set, so no letter can be sent');
  shared.pinloomMail ??= createTransport({
    url,
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 20_000,
  });
  return shared.pinloomMail;
}

/** Sends a letter; throws when the server does not take it. Never inside a transaction. */
export async function sendMail(letter: Letter): Promise<void> {
  await transport().sendMail({
    from: process.env.MAIL_FROM ?? 'Pinloom <pinloom@localhost>',
    ...letter,
  });
}

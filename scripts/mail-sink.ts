/**
 * A mail server that delivers nothing: it listens on 127.0.0.1 and keeps letters for the page /mail. For development
 * and tests. MAIL_SINK_PORT is its port, DATABASE_URL where it keeps them.
 */
import { type AddressObject, simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { closeDatabase, database } from '../db/client';
import { captureLetter } from '../db/queries/captured-mail';

const MAX_LETTER_BYTES = 256 * 1024;
const MAX_TEXT = 50_000;

const addresses = (value: AddressObject | AddressObject[] | undefined) =>
  [value ?? []]
    .flat()
    .map((one) => one.text)
    .join(', ')
    .slice(0, 500);

const server = new SMTPServer({
  authOptional: true,
  disabledCommands: ['STARTTLS', 'AUTH'],
  size: MAX_LETTER_BYTES,
  maxClients: 20,
  socketTimeout: 20_000,
  onData(stream, _session, done) {
    simpleParser(stream)
      .then(async (letter) => {
        if (stream.sizeExceeded) throw new Error('The letter is too large');
        await captureLetter(database(), {
          to: addresses(letter.to),
          from: addresses(letter.from),
          subject: (letter.subject ?? '').slice(0, 500),
          text: (letter.text ?? '').slice(0, MAX_TEXT),
          html: (letter.html || '').slice(0, MAX_TEXT),
        });
      })
      .then(() => done(), done);
  },
});

server.on('error', (error) => {
  console.error(`mail sink: ${error.message}`);
  process.exit(1);
});
server.listen(Number(process.env.MAIL_SINK_PORT ?? 2525), '127.0.0.1');

for (const signal of ['SIGTERM', 'SIGINT'] as const) {
  process.once(signal, () => server.close(() => void closeDatabase()));
}

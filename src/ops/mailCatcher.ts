/*
 * The demo's mail server: takes every e-mail on a port of 127.0.0.1 and keeps it in the database, where the page
 * /letters shows it. Nothing leaves this machine. npm start runs it when no SMTP_URL is set.
 */

import { SMTPServer } from 'smtp-server';
import { env, EnvError } from '@/config/env';
import { closeDatabase } from '@/models/database';
import { keepLetter } from '@/services/mailbox';
import { onStop } from './drain';
import { errorDetails, logLine, outliveReader } from './log';

const MOST_BYTES = 1024 * 1024;

/** A mail server that keeps what it is given; a mail that could not be kept is asked for again (451). */
export function mailCatcher(): SMTPServer {
  return new SMTPServer({
    banner: 'Stillfield demo: e-mail is caught here and goes nowhere',
    size: MOST_BYTES,
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    maxClients: 20,
    closeTimeout: 5000,
    onData(stream, session, done) {
      const parts: Buffer[] = [];
      stream.on('data', (part: Buffer) => parts.push(part));
      stream.once('error', done);
      stream.once('end', () => {
        if (stream.sizeExceeded) {
          return done(Object.assign(new Error('A letter takes at most 1 MB.'), { responseCode: 552 }));
        }
        const { mailFrom, rcptTo } = session.envelope;
        const from = mailFrom ? mailFrom.address : '';
        keepLetter(Buffer.concat(parts), { from, to: rcptTo.map(({ address }) => address) }).then(
          () => done(),
          (error: unknown) => {
            logLine('error', 'letter not kept', errorDetails(error));
            done(Object.assign(new Error('The letter could not be kept; send it again.'), { responseCode: 451 }));
          },
        );
      });
    },
  });
}

function main(): void {
  const port = env().MAIL_CATCHER_PORT;
  if (!port) throw new Error('MAIL_CATCHER_PORT is missing: npm start chooses one');
  const server = mailCatcher();
  server.on('error', (error) => logLine('warn', 'mail catcher', errorDetails(error)));
  server.server.once('error', () => process.exit(1));
  server.listen(port, '127.0.0.1', () => logLine('info', 'mail catcher running', { port }));
  outliveReader();
  onStop((reason) => {
    logLine('info', 'mail catcher draining', { reason });
    server.close(() => {
      void closeDatabase().then(() => process.exit(0));
    });
  });
}

if (require.main === module) {
  try {
    main();
  } catch (error) {
    console.error(error instanceof EnvError || error instanceof Error ? error.message : String(error));
    process.exit(1);
  }
}

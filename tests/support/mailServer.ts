import type { AddressInfo } from 'node:net';
import { SMTPServer, type SMTPServerOptions } from 'smtp-server';
import { type ReadMail, readMail } from '@/mail/readMail';

export interface TakenMail extends ReadMail {
  sender: string;
  recipients: string[];
  raw: string;
}

/** What a mail server says instead of yes: a reply code and its words. */
export const refusal = (responseCode: number, words: string) => Object.assign(new Error(words), { responseCode });

export interface TestMailServer {
  port: number;
  taken: TakenMail[];
  close(): Promise<void>;
}

/**
 * A mail server of a test's own on 127.0.0.1. `onTaken` runs after a mail is whole and before it is acknowledged; what
 * it throws is the answer.
 */
export async function mailServer(
  options: SMTPServerOptions = {},
  onTaken: (mail: TakenMail) => void = () => {},
): Promise<TestMailServer> {
  const taken: TakenMail[] = [];
  const server = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    closeTimeout: 500,
    onData(stream, session, done) {
      const parts: Buffer[] = [];
      stream.on('data', (part: Buffer) => parts.push(part));
      stream.once('end', () => {
        const raw = Buffer.concat(parts);
        const { mailFrom, rcptTo } = session.envelope;
        const mail = {
          ...readMail(raw),
          raw: raw.toString('latin1'),
          sender: mailFrom ? mailFrom.address : '',
          recipients: rcptTo.map(({ address }) => address),
        };
        taken.push(mail);
        try {
          onTaken(mail);
          done();
        } catch (error) {
          done(error as Error);
        }
      });
    },
    ...options,
  });
  // a client that goes away in the middle is part of the tests
  server.on('error', () => {});
  await new Promise<void>((resolve) => {
    server.listen(0, '127.0.0.1', () => resolve());
  });
  return {
    port: (server.server.address() as AddressInfo).port,
    taken,
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}

/* What the commands of npm run stillfield share: how they read a password, say what went wrong, and end. */

import { randomInt } from 'node:crypto';
import { createInterface } from 'node:readline';
import { Writable } from 'node:stream';
import { EnvError } from '@/config/env';
import { DomainError, Invalid } from '@/errors';
import { closeDatabase } from '@/models/database';

/** The arguments are not those of this command; the message is its usage line. */
export class Usage extends Error {}

function inWords(error: unknown): string {
  if (error instanceof Usage) return `Usage: npm run stillfield -- ${error.message}`;
  if (error instanceof Invalid) {
    return error.issues.map(({ pointer, message }) => `${pointer.slice(1) || 'input'} ${message}`).join('\n');
  }
  if (error instanceof DomainError || error instanceof EnvError) return error.message;
  if (error instanceof Error) return /^SequelizeConnection/.test(error.name) ? error.message : (error.stack ?? '');
  return String(error);
}

/** Runs a command with the arguments of this process; what went wrong is one line on standard error and exit code 1. */
export async function runCommand(main: (args: string[]) => Promise<void>): Promise<void> {
  try {
    await main(process.argv.slice(2));
  } catch (error) {
    process.stderr.write(`${inWords(error)}\n`);
    process.exitCode = 1;
  } finally {
    await closeDatabase();
  }
}

/** Without characters that look alike. */
const ALPHABET = 'abcdefghjkmnpqrstuvwxyz23456789';

/** A random password to hand over: five groups of four characters, about 99 bits. */
export function generatedPassword(): string {
  const group = () => Array.from({ length: 4 }, () => ALPHABET[randomInt(ALPHABET.length)]).join('');
  return Array.from({ length: 5 }, group).join('-');
}

/** Asks for a new password twice without showing it; from a pipe it is the first line. */
export async function askPassword(): Promise<string> {
  if (!process.stdin.isTTY) {
    for await (const line of createInterface({ input: process.stdin })) return line;
    throw new Usage('… with the password on standard input, or --generate');
  }
  const first = await askHidden('New password: ');
  const second = await askHidden('The same again: ');
  if (first !== second) throw new Invalid([{ pointer: '/password', message: 'was typed in two different ways' }]);
  return first;
}

function askHidden(question: string): Promise<string> {
  process.stderr.write(question);
  const silent = new Writable({ write: (_chunk, _encoding, done) => done() });
  const reader = createInterface({ input: process.stdin, output: silent, terminal: true });
  return new Promise((resolve, reject) => {
    reader.once('SIGINT', () => {
      reader.close();
      reject(new Usage('… was interrupted; nothing was changed'));
    });
    reader.question('', (answer) => {
      reader.close();
      process.stderr.write('\n');
      resolve(answer);
    });
  });
}

import nodemailer, { type Transporter } from 'nodemailer';
import { isLoopbackName } from '@/config/addresses';
import { env } from '@/config/env';
import { oneLine } from './letter';
import type { Mail } from './message';

/** The mail server refused this mail for good (a 5xx reply about its recipient or content); its words are the message. */
export class MailRefused extends Error {}

/** There is no mail server to hand anything to; the message says what to set. */
export class NoMailServer extends Error {}

const CONNECT_MS = 10_000;
const SILENCE_MS = 20_000;
/** One delivery at the longest: shorter than the outbox's lease, so that nobody else starts on the same mail. */
const WHOLE_MS = 90_000;

/**
 * Where e-mail goes: `smtp` is the lab's own server, `caught` the demo's catcher (it goes nowhere), `nowhere` means
 * that it waits.
 */
export function mailWay(): 'smtp' | 'caught' | 'nowhere' {
  if (env().SMTP_URL) return 'smtp';
  return env().STILLFIELD_DEMO ? 'caught' : 'nowhere';
}

/** The sender's address: MAIL_FROM, or no-reply@ the host of APP_ORIGIN (an address literal where that is an IP). */
export function senderAddress(): string {
  const { MAIL_FROM, APP_ORIGIN } = env();
  if (MAIL_FROM) return MAIL_FROM;
  const { hostname } = new URL(APP_ORIGIN);
  if (hostname.startsWith('[')) return `no-reply@[IPv6:${hostname.slice(1, -1)}]`;
  return /^[\d.]+$/.test(hostname) ? `no-reply@[${hostname}]` : `no-reply@${hostname}`;
}

/**
 * How to reach the mail server. Off this machine STARTTLS is required where TLS does not stand from the first byte, and
 * the certificate is checked.
 * @throws {NoMailServer}
 */
export function connectionTo(smtpUrl: string | undefined) {
  if (!smtpUrl) {
    throw new NoMailServer('No mail server is configured: set SMTP_URL and restart, and what waits here is sent.');
  }
  const url = new URL(smtpUrl);
  const secure = url.protocol === 'smtps:';
  const user = decodeURIComponent(url.username);
  return {
    host: url.hostname.replace(/^\[|\]$/g, ''),
    port: Number(url.port) || (secure ? 465 : 587),
    secure,
    requireTLS: !secure && !isLoopbackName(url.hostname),
    ignoreTLS: !secure && isLoopbackName(url.hostname),
    ...(user && { auth: { user, pass: decodeURIComponent(url.password) } }),
    connectionTimeout: CONNECT_MS,
    greetingTimeout: CONNECT_MS,
    dnsTimeout: CONNECT_MS,
    socketTimeout: SILENCE_MS,
    disableFileAccess: true,
    disableUrlAccess: true,
  };
}

function configured(): string | undefined {
  const { SMTP_URL, STILLFIELD_DEMO, MAIL_CATCHER_PORT } = env();
  if (SMTP_URL) return SMTP_URL;
  if (!STILLFIELD_DEMO) return undefined;
  if (MAIL_CATCHER_PORT) return `smtp://127.0.0.1:${MAIL_CATCHER_PORT}`;
  throw new NoMailServer('The demo’s mail catcher is not running: npm start runs it, or set SMTP_URL.');
}

/** One address and nothing beside it: no comma, no angle bracket, no line end can add a recipient or a header. */
const ADDRESS = /^[^\s\p{Cc}\p{Zl}\p{Zp}<>()[\]\\,;:"@]+@[^\s\p{Cc}\p{Zl}\p{Zp}<>()[\]\\,;:"@]+$/u;

interface ServerRefusal {
  responseCode?: number;
  response?: string;
  command?: string;
  rejectedErrors?: ServerRefusal[];
}

/** 5xx to the recipient or the content is about this mail; to anything before it, about how the lab has set us up. */
function refusalOf(error: unknown): MailRefused | null {
  const sent = error as ServerRefusal;
  const { responseCode = 0, response = '', command = '' } = sent.rejectedErrors?.[0] ?? sent;
  const ours = [530, 534, 535, 538].includes(responseCode);
  const aboutThisMail = /^(RCPT TO|DATA)\b/i.test(command);
  if (responseCode < 500 || responseCode > 599 || ours || !aboutThisMail) return null;
  return new MailRefused(oneLine(response) || `The mail server answered ${responseCode}.`);
}

/**
 * Hands one mail to the mail server.
 * @param messageId stable over all tries, with its angle brackets
 * @param from the lab's name; the address is the configured one
 * @throws {MailRefused} for good, {NoMailServer}, or whatever else came between: then it is tried again
 */
export async function deliver(mail: Mail, messageId: string, from: string): Promise<void> {
  if (!ADDRESS.test(mail.to.address)) throw new MailRefused(`${oneLine(mail.to.address)} is not one e-mail address.`);
  const transport: Transporter = nodemailer.createTransport(connectionTo(configured()));
  const sender = senderAddress();
  const { to, text, html } = mail;
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(new Error(`The mail server took longer than ${WHOLE_MS / 1000} s.`)), WHOLE_MS);
  });
  try {
    const sending = transport.sendMail({
      messageId,
      from: { name: oneLine(from), address: sender },
      to: { name: oneLine(to.name), address: to.address },
      subject: oneLine(mail.subject),
      envelope: { from: sender, to: to.address },
      text,
      html,
      headers: { 'Auto-Submitted': 'auto-generated' },
    });
    await Promise.race([sending, late]);
  } catch (error) {
    throw refusalOf(error) ?? error;
  } finally {
    clearTimeout(timer);
    transport.close();
  }
}

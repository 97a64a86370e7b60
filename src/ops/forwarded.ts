import type { IncomingHttpHeaders } from 'node:http';
import { type BlockList, isIP } from 'node:net';
import { containsAddress, isLoopbackName, plainAddress } from '@/config/addresses';

/** What the rest of the product may believe about where a request came from. */
export interface Forwarded {
  /** one address: the client's, as far as trusted machines vouch for it */
  address: string;
  proto: 'http' | 'https';
  host: string;
}

const HEADERS = [
  'forwarded',
  'x-forwarded-for',
  'x-forwarded-host',
  'x-forwarded-port',
  'x-forwarded-proto',
  'x-real-ip',
];

const last = (value: string | string[] | undefined): string =>
  String(value ?? '')
    .split(',')
    .at(-1)
    ?.trim() ?? '';

/**
 * The client of a request. A peer that is no trusted proxy is itself the client and its forwarding headers count for
 * nothing. Behind trusted proxies it is the right-most address of X-Forwarded-For that is not a trusted proxy: every
 * entry to its left was written by somebody nobody vouches for. An entry that is no address ends the walk.
 *
 * @param peer address of the socket
 * @param headers as received
 * @param trusted ranges of TRUSTED_PROXIES
 */
export function forwarded(
  peer: string,
  headers: IncomingHttpHeaders,
  trusted: BlockList,
  encrypted = false,
): Forwarded {
  const address = plainAddress(peer);
  const own: Forwarded = { address, proto: encrypted ? 'https' : 'http', host: headers.host ?? '' };
  if (!containsAddress(trusted, address)) return own;

  const hops = String(headers['x-forwarded-for'] ?? '')
    .split(',')
    .map(plainAddress)
    .reverse();
  let client = address;
  for (const hop of hops) {
    if (isIP(hop) === 0) break;
    client = hop;
    if (!containsAddress(trusted, hop)) break;
  }
  const proto = last(headers['x-forwarded-proto']).toLowerCase();
  return {
    address: client,
    proto: proto === 'https' || proto === 'http' ? proto : own.proto,
    host: last(headers['x-forwarded-host']) || own.host,
  };
}

/** Replaces every forwarding header of a request by what `forwarded` believes, so that nothing behind it can be told. */
export function overwriteForwarded(headers: IncomingHttpHeaders, believed: Forwarded): void {
  for (const name of HEADERS) delete headers[name];
  headers['x-forwarded-for'] = believed.address;
  headers['x-forwarded-proto'] = believed.proto;
  if (believed.host) headers['x-forwarded-host'] = believed.host;
}

/**
 * Where to send somebody who opens a local lab under another name of the same machine (127.0.0.1 instead of localhost):
 * signing in there would fail, because its Origin is not the product's. Null for everything but a page being opened.
 */
export function sameMachineElsewhere(headers: IncomingHttpHeaders, url: string, origin: string): string | null {
  if (headers['sec-fetch-mode'] !== 'navigate' || !headers.host) return null;
  const [here, home] = [`http://${headers.host}`, new URL(origin)];
  if (!URL.canParse(here) || !isLoopbackName(new URL(here).hostname) || !isLoopbackName(home.hostname)) return null;
  return new URL(here).host === home.host ? null : `${home.origin}${url.startsWith('/') ? url : '/'}`;
}

import { BlockList, isIP } from 'node:net';

/** `::ffff:10.0.0.1` is the IPv4 address 10.0.0.1; a zone index (`fe80::1%eth0`) names no peer. */
export function plainAddress(address: string): string {
  const text = address.trim().replace(/%.*$/, '');
  const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(text);
  return mapped?.[1] ?? text;
}

/** What is wrong with one entry of a CIDR list (`10.0.0.0/8`, `192.0.2.7`, `fd00::/8`), or null when it is fine. */
export function rangeProblem(range: string): string | null {
  const [address = '', prefix, ...rest] = range.split('/');
  const family = isIP(address);
  if (family === 0 || rest.length > 0) return `"${range}" is no address and no range like 10.0.0.0/8`;
  if (prefix === undefined) return null;
  const longest = family === 4 ? 32 : 128;
  const ok = /^\d{1,3}$/.test(prefix) && Number(prefix) <= longest;
  return ok ? null : `"${range}" has a prefix length outside 0 to ${longest}`;
}

/** Addresses and ranges that passed `rangeProblem`, ready to ask `containsAddress`. */
export function addressRanges(ranges: readonly string[]): BlockList {
  const list = new BlockList();
  for (const range of ranges) {
    const [address = '', prefix] = range.split('/');
    const family = isIP(address) === 6 ? 'ipv6' : 'ipv4';
    if (prefix === undefined) list.addAddress(address, family);
    else list.addSubnet(address, Number(prefix), family);
  }
  return list;
}

/** True when the address is one of the ranges; false for anything that is no address. */
export function containsAddress(ranges: BlockList, address: string): boolean {
  const plain = plainAddress(address);
  const family = isIP(plain);
  return family !== 0 && ranges.check(plain, family === 6 ? 'ipv6' : 'ipv4');
}

/** `127.0.0.0/8`, `localhost` and `[::1]`: what a browser treats as the same machine. Takes `URL.hostname`. */
export function isLoopbackName(hostname: string): boolean {
  return hostname === 'localhost' || hostname === '[::1]' || /^127\.\d+\.\d+\.\d+$/.test(hostname);
}

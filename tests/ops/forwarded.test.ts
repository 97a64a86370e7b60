import { addressRanges } from '@/config/addresses';
import { forwarded, overwriteForwarded, sameMachineElsewhere } from '@/ops/forwarded';

const NOBODY = addressRanges([]);
const PROXIES = addressRanges(['10.0.0.0/8', '192.0.2.7', 'fd00::/8']);

test.each([
  ['no proxy, nothing claimed', '198.51.100.4', undefined, NOBODY, '198.51.100.4'],
  ['no proxy, a claim counts for nothing', '198.51.100.4', '203.0.113.9', NOBODY, '198.51.100.4'],
  ['a peer outside the list cannot claim', '198.51.100.4', '203.0.113.9', PROXIES, '198.51.100.4'],
  ['one proxy names the client', '10.0.0.1', '203.0.113.9', PROXIES, '203.0.113.9'],
  ['what the client wrote itself is to the left', '10.0.0.1', '127.0.0.1, 203.0.113.9', PROXIES, '203.0.113.9'],
  ['two proxies in a row', '10.0.0.1', '203.0.113.9, 192.0.2.7', PROXIES, '203.0.113.9'],
  ['only proxies: the left-most of them', '10.0.0.1', '10.0.0.3, 10.0.0.2', PROXIES, '10.0.0.3'],
  ['a trusted peer without the header', '10.0.0.1', undefined, PROXIES, '10.0.0.1'],
  ['an entry that is no address ends the walk', '10.0.0.1', '203.0.113.9, unknown', PROXIES, '10.0.0.1'],
  ['an IPv4 peer on an IPv6 socket', '::ffff:10.0.0.1', '203.0.113.9', PROXIES, '203.0.113.9'],
  ['an IPv6 client', 'fd00::1', '2001:db8::5', PROXIES, '2001:db8::5'],
])('%s', (_, peer, claimed, trusted, address) => {
  const headers = claimed === undefined ? {} : { 'x-forwarded-for': claimed };
  expect(forwarded(peer, headers, trusted).address).toBe(address);
});

test('scheme and host are believed from a proxy only', () => {
  const headers = { host: 'inner:3000', 'x-forwarded-proto': 'https', 'x-forwarded-host': 'stillfield.example' };
  expect(forwarded('10.0.0.1', headers, PROXIES)).toMatchObject({ proto: 'https', host: 'stillfield.example' });
  expect(forwarded('198.51.100.4', headers, PROXIES)).toMatchObject({ proto: 'http', host: 'inner:3000' });
  expect(forwarded('10.0.0.1', { ...headers, 'x-forwarded-proto': 'gopher' }, PROXIES).proto).toBe('http');
});

test('every forwarding header is replaced', () => {
  const headers = {
    host: 'inner:3000',
    forwarded: 'for=203.0.113.9',
    'x-real-ip': '203.0.113.9',
    'x-forwarded-port': '443',
    'x-forwarded-for': '203.0.113.9',
    cookie: 'kept',
  };
  overwriteForwarded(headers, forwarded('198.51.100.4', headers, PROXIES));
  expect(headers).toEqual({
    host: 'inner:3000',
    cookie: 'kept',
    'x-forwarded-for': '198.51.100.4',
    'x-forwarded-proto': 'http',
    'x-forwarded-host': 'inner:3000',
  });
});

test.each([
  [
    'another name of this machine',
    '127.0.0.1:3000',
    'navigate',
    'http://localhost:3000',
    'http://localhost:3000/jobs?x=1',
  ],
  ['the right name', 'localhost:3000', 'navigate', 'http://localhost:3000', null],
  ['a script', '127.0.0.1:3000', undefined, 'http://localhost:3000', null],
  ['a fetch of a page', '127.0.0.1:3000', 'cors', 'http://localhost:3000', null],
  ['a lab behind its proxy', '127.0.0.1:3000', 'navigate', 'https://stillfield.example', null],
  ['a name that is no loopback', 'stillfield.example', 'navigate', 'http://localhost:3000', null],
])('a page opened under %s', (_, host, mode, origin, target) => {
  expect(sameMachineElsewhere({ host, 'sec-fetch-mode': mode }, '/jobs?x=1', origin)).toBe(target);
});

import fc from 'fast-check';
import { agentName } from '@/app/(lab)/account/agentName';
import { nextPath } from '@/app/(auth)/sign-in/nextPath';

test.each([
  ['/sweeps', '/sweeps'],
  ['/sweeps/k3x9?trace=1#worst', '/sweeps/k3x9?trace=1#worst'],
  ['/a/../jobs', '/jobs'],
  ['/products/%C3%BC', '/products/%C3%BC'],
  [undefined, '/'],
  [['/jobs', '/sweeps'], '/'],
  ['', '/'],
  ['jobs', '/'],
  ['https://evil.example/', '/'],
  ['//evil.example', '/'],
  ['///evil.example', '/'],
  ['/\\evil.example', '/'],
  ['/\t/evil.example', '/'],
  ['/\n/evil.example', '/'],
  ['/..//evil.example', '/'],
  ['/.//evil.example', '/'],
  ['/jobs\\..\\..', '/'],
  ['javascript:alert(1)', '/'],
  ['/api/session', '/'],
  ['/api', '/'],
  ['/x/../api/session', '/'],
  ['/sign-in?next=/sign-in', '/'],
  [`/${'x'.repeat(2001)}`, '/'],
  ['/apiary', '/apiary'],
])('after signing in, %j leads to %s', (wanted, path) => expect(nextPath(wanted)).toBe(path));

test('property: wherever it leads, it stays on this site', () => {
  const pieces = fc.constantFrom(
    '/',
    '\\',
    '.',
    '..',
    ':',
    '//',
    '@',
    '%2f',
    '%5c',
    '\t',
    '?',
    '#',
    'http:',
    'evil.example',
  );
  fc.assert(
    fc.property(fc.array(pieces, { maxLength: 10 }), (parts) => {
      const target = nextPath(`/${parts.join('')}`);
      return new URL(target, 'http://lab.example').origin === 'http://lab.example';
    }),
    { numRuns: 2000 },
  );
});

test.each([
  ['Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', 'Firefox on Linux'],
  [
    'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/143.0.0.0 Safari/537.36',
    'Chrome on Windows',
  ],
  [
    'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/143.0.0.0 Safari/537.36 Edg/143.0',
    'Edge on Windows',
  ],
  [
    'Mozilla/5.0 (Macintosh; Intel Mac OS X 10_15_7) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.0 Safari/605.1.15',
    'Safari on macOS',
  ],
  [
    'Mozilla/5.0 (iPhone; CPU iPhone OS 18_0 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.0 Mobile/15E148 Safari/604.1',
    'Safari on iOS',
  ],
  [
    'Mozilla/5.0 (Linux; Android 15) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/143.0.0.0 Mobile Safari/537.36',
    'Chrome on Android',
  ],
  ['curl/8.5.0', 'curl'],
  ['', 'Unknown browser'],
])('%s is %s', (agent, name) => expect(agentName(agent)).toBe(name));

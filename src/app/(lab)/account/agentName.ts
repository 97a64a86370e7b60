/** In the order in which they give themselves away: later ones also carry the names of the browsers they descend from. */
const PROGRAMS: [mark: RegExp, name: string][] = [
  [/\bEdgA?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\bFirefox\//, 'Firefox'],
  [/\bFxiOS\//, 'Firefox'],
  [/\b(Headless)?Chrom(e|ium)\//, 'Chrome'],
  [/\bCriOS\//, 'Chrome'],
  [/\bSafari\//, 'Safari'],
];

const SYSTEMS: [mark: RegExp, name: string][] = [
  [/\bAndroid\b/, 'Android'],
  [/\b(iPhone|iPad)\b/, 'iOS'],
  [/\bWindows\b/, 'Windows'],
  [/\bMac OS X\b/, 'macOS'],
  [/\bCrOS\b/, 'ChromeOS'],
  [/\bLinux\b/, 'Linux'],
];

/**
 * A User-Agent header in words, `Firefox on Linux`. Browsers say what they like here, so it is a reminder for the
 * reader and nothing is decided by it.
 */
export function agentName(agent: string): string {
  const find = (list: [RegExp, string][]) => list.find(([mark]) => mark.test(agent))?.[1];
  const program = find(PROGRAMS) ?? /^[A-Za-z][\w.-]{0,30}(?=\/|$)/.exec(agent)?.[0];
  const system = find(SYSTEMS);
  if (!program) return system ? `A browser on ${system}` : 'Unknown browser';
  return system ? `${program} on ${system}` : program;
}

import type { MainsLine, Polarisation, Purpose } from '@/emc/kinds';

/** What a file's name suggests. Nothing here is known; a person confirms it. */
export interface NameProposals {
  polarisation?: Polarisation;
  line?: MainsLine;
  heightM?: number;
  /** Modification state as labs write it: M0, M1… */
  state?: string;
  purpose?: Purpose;
}

const POLARISATIONS: Record<string, Polarisation> = {
  h: 'horizontal',
  hor: 'horizontal',
  horiz: 'horizontal',
  horizontal: 'horizontal',
  hpol: 'horizontal',
  v: 'vertical',
  ver: 'vertical',
  vert: 'vertical',
  vertical: 'vertical',
  vpol: 'vertical',
};
const LINES: Record<string, MainsLine> = {
  l: 'L',
  line: 'L',
  phase: 'L',
  n: 'N',
  neutral: 'N',
  l1: 'L1',
  l2: 'L2',
  l3: 'L3',
};
const PURPOSE_WORDS: Record<string, Purpose> = {
  amb: 'ambient',
  ambient: 'ambient',
  background: 'ambient',
  prescan: 'prescan',
  pre: 'prescan',
  scan: 'prescan',
  final: 'final',
  finals: 'final',
};

/** One value when the tokens agree, none when they contradict one another. */
function single<T>(values: (T | undefined)[]): T | undefined {
  const found = new Set(values.filter((value) => value !== undefined));
  return found.size === 1 ? [...found][0] : undefined;
}

/** Antenna height: `h150` and `150cm` in centimetres, `1m5` and `1.5m` in metres; a bare 100 to 400 beside a polarisation. */
function heightOf(token: string, radiated: boolean): number | undefined {
  const centimetres = /^(?:h(\d{2,3})|(\d{2,3})cm|height(\d{2,3}))$/.exec(token);
  const cm = centimetres ? Number(centimetres[1] ?? centimetres[2] ?? centimetres[3]) : null;
  if (cm !== null) return cm >= 50 && cm <= 600 ? cm / 100 : undefined;
  const bare = radiated && /^[1-4]\d0$/.test(token) ? Number(token) : null;
  return bare !== null && bare <= 400 ? bare / 100 : undefined;
}

/**
 * Reads the tokens of a file name such as `ld40_m2_h_100.csv` or `TP9 M0 vert 1.5m amb.txt`.
 * @param fileName with or without a folder and an extension
 */
export function proposeFromName(fileName: string): NameProposals {
  const base = (fileName.split(/[\\/]/).at(-1) ?? '').replace(/\.[A-Za-z][A-Za-z0-9]{0,4}$/, '').slice(0, 300);
  const metres = /(?:^|[^a-z0-9.])([1-4](?:[.,]\d{1,2}))\s?m(?![a-z0-9])/i.exec(base)?.[1];
  const tokens = base
    .replace(/([a-z])([A-Z][a-z])/g, '$1 $2')
    .toLowerCase()
    .split(/[^a-z0-9]+/)
    .filter((token) => token !== '');
  const polarisation = single(tokens.map((token) => POLARISATIONS[token]));
  const line = single(tokens.map((token) => LINES[token]));
  const heightM = metres
    ? Number(metres.replace(',', '.'))
    : single(tokens.map((token) => heightOf(token, !!polarisation)));
  const state = single(tokens.map((token) => /^m\d{1,2}$/.exec(token)?.[0].toUpperCase()));
  const purpose = single(tokens.map((token) => PURPOSE_WORDS[token]));
  return {
    ...(polarisation && !line && { polarisation }),
    ...(line && !polarisation && { line }),
    ...(heightM !== undefined && { heightM }),
    ...(state && { state }),
    ...(purpose && { purpose }),
  };
}

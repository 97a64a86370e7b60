import { COMMON_WORDS } from './commonPasswordWords';

/*
 * The list of common passwords: every word of commonPasswordWords.ts in the dress people give it. Rather than storing
 * each of those spellings, a password is undressed (case, leet digits, what stands before and after, doubling) and what
 * remains is looked up. Walks along the keyboard or the alphabet and short repeats need no list.
 */

const LEET: Record<string, string> = {
  '0': 'o',
  '1': 'i',
  '3': 'e',
  '4': 'a',
  '5': 's',
  '7': 't',
  '@': 'a',
  $: 's',
  '!': 'i',
};

const ROWS = ['qwertyuiop', 'qwertzuiop', 'azertyuiop', 'asdfghjkl', 'qsdfghjklm', 'zxcvbnm', 'yxcvbnm'];
const COLUMNS = [
  '1qaz',
  '2wsx',
  '3edc',
  '4rfv',
  '5tgb',
  '6yhn',
  '7ujm',
  '0okm',
  '9ijn',
  '8uhb',
  '7ygv',
  '6tfc',
  '5rdx',
  '4esz',
  '1q2w3e4r5t6y7u8i9o0p',
];
const ORDERS = ['abcdefghijklmnopqrstuvwxyz', '01234567890', '!@#$%^&*()', '!"£$%^&*()', ...ROWS, ...COLUMNS];

/** Neighbours in one of the rows, forwards or backwards. */
const STEPS: ReadonlySet<string> = new Set(
  ORDERS.flatMap((row) => [...row].slice(1).flatMap((key, i) => [row[i] + key, key + row[i]])),
);

/** How many characters of added digits and marks a known word may carry and still be guessed among the first. */
const DRESS = 8;

function unleet(text: string): string {
  return text.replace(/[013457@$!]/g, (sign) => LEET[sign]!);
}

/** The shortest unit that repeats to the whole text (the last copy may be cut short); the text itself if none does. */
function unit(text: string): string {
  for (let length = 1; length <= text.length / 2; length++) {
    let same = true;
    for (let i = length; same && i < text.length; i++) same = text[i] === text[i - length];
    if (same) return text.slice(0, length);
  }
  return text;
}

/** True for `qwertyuiopasdf`, `abcdefghijkl`, `1qaz2wsx3edc`: at most one break in four characters. */
function isWalk(text: string): boolean {
  let breaks = 0;
  for (let i = 1; i < text.length; i++) if (text[i] !== text[i - 1] && !STEPS.has(text.slice(i - 1, i + 1))) breaks++;
  return breaks <= Math.floor((text.length - 1) / 4);
}

/** True for dates and years in digits, walks, repeats and anything short: what adds next to nothing to a word. */
function isDress(text: string): boolean {
  return text.length <= DRESS || unit(text).length <= 4 || isWalk(text);
}

/** A listed word, once or doubled, whatever marks stand between its letters. */
function isWord(core: string): boolean {
  const letters = core.replace(/[^\p{L}]/gu, '');
  return letters !== '' && (COMMON_WORDS.has(letters) || COMMON_WORDS.has(unit(letters)));
}

/** Every way to take off what is not a letter: nothing, at the front, at the back, on both sides. */
function cores(text: string): string[] {
  const front = text.replace(/^[^\p{L}]+/u, '');
  const back = text.replace(/[^\p{L}]+$/u, '');
  return [...new Set([text, front, back, front.replace(/[^\p{L}]+$/u, '')])];
}

/**
 * True for a password that is guessed first: a listed word, alone or doubled, with digits and marks around it or in
 * place of letters, or a walk or a short repeat. Meant for passwords of at least 12 characters.
 */
export function isCommonPassword(password: string): boolean {
  const text = password.normalize('NFKC').toLowerCase();
  if (unit(text).length <= 4 || isWalk(text)) return true;
  if (isDress(text.replace(/\p{L}/gu, '')) && isWord(text)) return true;
  return cores(text).some((core) => isDress(text.replace(core, '')) && isWord(unleet(core)));
}

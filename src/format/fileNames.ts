const LONGEST = 64;

/**
 * A file's name as it is shown: control and direction marks, which can make one name look like another, stand as `·`,
 * and a long one is cut in the middle so that its end still tells what it is.
 */
export function formatFileName(name: string, longest = LONGEST): string {
  const plain = [...name.replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Co}]/gu, '·')];
  if (plain.length <= longest) return plain.join('');
  const end = Math.floor((longest - 1) / 3);
  return `${plain.slice(0, longest - 1 - end).join('')}…${plain.slice(-end).join('')}`;
}

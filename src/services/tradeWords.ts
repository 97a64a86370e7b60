import { Op, type WhereOptions } from 'sequelize';

/** The trade has several words for each of these; any finds the others. */
const SAME: readonly (readonly string[])[] = [
  ['lisn', 'amn'],
  ['isn', 'aan'],
  ['pad', 'attenuator'],
  ['coax', 'cable'],
  ['preamp', 'preamplifier', 'lna'],
  ['clamp', 'current probe', 'current-probe'],
  ['analyzer', 'analyser'],
  ['qp', 'quasi-peak'],
  ['av', 'average'],
  ['pk', 'peak'],
  ['mains', 'ac-mains', 'ac mains'],
  ['radiated', 'enclosure'],
];

/** Every word has to stand in one of the columns; `%` and `_` in a word are themselves. */
export function wordsIn(q: string, columns: readonly string[]): WhereOptions {
  const words = q.toLowerCase().split(/\s+/).filter(Boolean).slice(0, 8);
  return {
    [Op.and]: words.map((word) => ({
      [Op.or]: [...new Set([word, ...SAME.filter((one) => one.includes(word)).flat()])].flatMap((form) =>
        columns.map((column) => ({ [column]: { [Op.like]: `%${form.replace(/[\\%_]/g, '\\$&')}%` } })),
      ),
    })),
  };
}

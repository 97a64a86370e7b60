import { authorise, type Actor } from '@/auth/actor';
import type { FactorQuantity, Polarisation } from '@/emc/kinds';
import { factorDifference } from '@/emc/revisionDifference';
import { Invalid, TooLarge } from '@/errors';
import { decode } from '@/ingest/bytes';
import { factorColumns, settleFactor, type FactorColumn } from '@/ingest/factorTable';
import { IngestError } from '@/ingest/ingestError';
import { signQuestion, turnsOver } from '@/ingest/lossOrGain';
import { statedIn, statedQuantity, type Stated } from '@/ingest/stated';
import type { Recognition } from '@/ingest/types';
import { readUpload } from '@/models/blobs';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { unitOfWork } from '@/models/unitOfWork';
import type { Upload } from '@/models/upload';
import type { FactorRemark, FactorTableChoice, FactorTablePreview } from '@/schemas/tables';
import { findEquipment } from './factorTables';
import { toCoreTable } from './signalPaths';
import { findUpload, recognitionOf } from './sweepFiles';
import { pathRevisionsWith } from './tableUse';

/** Text of tables; a network-parameter file of 20 000 points has 3 MB. */
const MOST_BYTES = 8 * 1024 * 1024;
const MOST_ROWS = 20_000;
/** Between neighbouring rows; calibration tables are made so that they step less. */
const JUMP_DB = 3;
/** Rows further apart than this ratio leave a long straight line between them. */
const SPARSE_RATIO = 3;

export interface TableFile {
  upload: Upload;
  recognition: Recognition;
  columns: FactorColumn[];
  stated: Stated;
}

/**
 * The tables of a held file as written. Call inside a unit of work.
 * @throws {IngestError} with its line, where it holds none
 */
export async function readTableFile(
  fileId: string,
  choice: Pick<FactorTableChoice, 'frequencyUnit'>,
): Promise<TableFile> {
  const upload = await findUpload(fileId);
  if (upload.bytes > MOST_BYTES) throw new TooLarge('A factor table takes at most 8 MB. Export fewer points.');
  const bytes = await readUpload(upload.id);
  const recognition = recognitionOf(upload);
  const columns = factorColumns(bytes, recognition, choice.frequencyUnit ?? undefined);
  const long = columns.find(({ frequencyHz }) => frequencyHz.length > MOST_ROWS);
  if (long) {
    const rows = long.frequencyHz.length;
    const message = `“${long.name}” holds ${rows} rows; a factor table takes at most ${MOST_ROWS}. Export fewer points.`;
    throw new IngestError(null, `${rows} rows`, `at most ${MOST_ROWS} rows`, message);
  }
  return { upload, recognition, columns, stated: statedBefore(bytes, recognition) };
}

function statedBefore(bytes: Uint8Array, { headerLine, firstDataLine }: Recognition): Stated {
  const before = (headerLine ?? firstDataLine) - 1;
  const lines = decode(bytes).text.split('\n', before);
  return statedIn(lines.map((text, i) => ({ line: i + 1, text })));
}

function polarisationIn(text: string): Polarisation | null {
  if (/horizontal|\bhor\b|\bH\b/.test(text)) return 'horizontal';
  return /vertical|\bver\b|\bV\b/.test(text) ? 'vertical' : null;
}

/** What only takes away or only adds; a factor that turns one quantity into another has figures of either sign. */
const isOneWay = (quantity: FactorQuantity) => quantity === 'gain' || turnsOver(quantity);

/** What is worth a look: jumps, a range that ends earlier than before, figures that were turned over. */
export function factorRemarks(
  column: FactorColumn,
  settled: { quantity: FactorQuantity; negated: boolean; valueDb: readonly number[] } | null,
  before: FactorTableRevision | null,
  recognition: Recognition,
  distanceM: number | null,
): FactorRemark[] {
  const { frequencyHz: hz } = column;
  const db = settled?.valueDb ?? column.writtenDb;
  const remarks: FactorRemark[] = [];
  const say = (kind: FactorRemark['kind'], at: Partial<FactorRemark> = {}) =>
    remarks.push({ kind, fromHz: null, toHz: null, db: null, ...at });
  if (before) {
    const [first, last] = [before.frequenciesHz[0]!, before.frequenciesHz.at(-1)!];
    if (hz.at(-1)! < last) say('no-factor-above', { fromHz: hz.at(-1)!, toHz: last });
    if (hz[0]! > first) say('no-factor-below', { fromHz: first, toHz: hz[0]! });
    if (before.distanceM !== distanceM) say('distance-differs');
  }
  if (column.turned) say('turned');
  if (settled?.negated) say('negated');
  else if (
    isOneWay(settled?.quantity ?? column.said.among?.[0] ?? 'loss') &&
    db.some((one) => one < 0) &&
    db.some((one) => one > 0)
  )
    say('mixed-signs');
  if (!column.unitStated) say('unit-not-stated');
  if (recognition.kind === 'sweep') say('not-said-to-be-factors');
  for (let i = 1; i < hz.length; i++) {
    const [fromHz, toHz, by] = [hz[i - 1]!, hz[i]!, db[i]! - db[i - 1]!];
    if (Math.abs(by) > JUMP_DB) say('jump', { fromHz, toHz, db: by });
    else if (toHz / fromHz > SPARSE_RATIO) say('gap-between-rows', { fromHz, toHz });
  }
  return remarks;
}

/** The newest revision of a name on an item, or null. */
export async function newestTable(equipmentId: number, name: string): Promise<FactorTableRevision | null> {
  return FactorTableRevision.findOne({ where: { equipmentId, name }, order: [['revision', 'DESC']] });
}

const nothing = (recognition: Recognition): FactorTablePreview => ({
  refusal: null,
  frequencyUnit: recognition.frequency.unit,
  frequencyEvidence: recognition.frequency.unitEvidence,
  proposedFrequencyUnit: recognition.frequency.proposedUnit,
  tablesInFile: [],
  tables: [],
  questions: [],
  source: null,
  paths: [],
});

/** What a held file would enter, beside the revisions before; nothing is stored. */
export async function previewFactorTable(actor: Actor | null, choice: FactorTableChoice): Promise<FactorTablePreview> {
  authorise(actor, 'table.preview');
  return unitOfWork(async () => {
    const equipment = await findEquipment(choice.equipmentId);
    const recognition = recognitionOf(await findUpload(choice.fileId));
    const preview = nothing(recognition);
    if (!recognition.refusal && choice.frequencyUnit === null && recognition.frequency.unit === null) {
      const { frequency } = recognition;
      const text = `No line settles the unit of the frequencies, ${frequency.firstHz} to ${frequency.lastHz} if they are in ${frequency.proposedUnit}. Which is it?`;
      preview.questions.push({ key: 'frequencyUnit', tableIndex: null, text });
    }
    // Read as proposed, so that what else is open can be asked at once; nothing is entered from a proposal.
    const frequencyUnit = choice.frequencyUnit ?? recognition.frequency.unit ?? recognition.frequency.proposedUnit;
    let file: TableFile;
    try {
      file = await readTableFile(choice.fileId, { frequencyUnit });
    } catch (error) {
      if (!(error instanceof IngestError)) throw error;
      const { line, found, expected, message } = error;
      return { ...preview, refusal: { line, found, expected, message } };
    }
    const { columns, stated } = file;
    preview.source = stated.source?.value ?? null;
    preview.tablesInFile = columns.map((column, index) => {
      const words = `${column.name} ${stated.polarisation?.value ?? ''}`;
      return {
        index,
        heading: column.name,
        quantity: column.said.quantity,
        unit: column.unit,
        rows: column.frequencyHz.length,
        firstHz: column.frequencyHz[0]!,
        lastHz: column.frequencyHz.at(-1)!,
        lowestDb: column.writtenDb.reduce((low, one) => Math.min(low, one), Infinity),
        highestDb: column.writtenDb.reduce((high, one) => Math.max(high, one), -Infinity),
        proposed: {
          name: columns.length === 1 ? (stated.name?.value ?? null) : null,
          polarisation: column.said.quantity === 'antenna-factor' ? polarisationIn(words) : null,
          distanceM: stated.distance ? statedQuantity(stated.distance.value, 'm') : null,
        },
      };
    });
    const revised: string[] = [];
    for (const [i, table] of choice.tables.entries()) {
      const column = columns[table.index];
      if (!column) throw new Invalid([{ pointer: `/tables/${i}/index`, message: 'is no table of this file' }]);
      const settled = settleFactor(column, table.quantity ? { quantity: table.quantity } : {});
      if (!settled) {
        const text = signQuestion(column.name, column.said);
        const key = column.said.among ? 'quantity' : 'lossOrGain';
        preview.questions.push({ key, tableIndex: table.index, text });
      }
      const before = await newestTable(equipment.id, table.name);
      if (before) revised.push(before.publicId);
      const valueDb = settled?.valueDb ?? column.writtenDb;
      const core = { ...column, id: '', quantity: settled?.quantity ?? 'loss', valueDb };
      preview.tables.push({
        index: table.index,
        name: table.name,
        quantity: settled?.quantity ?? null,
        frequencyHz: column.frequencyHz,
        valueDb,
        remarks: factorRemarks(column, settled, before, recognition, table.distanceM),
        before: before && {
          id: before.publicId,
          revision: before.revision,
          enteredAt: before.createdAt.toISOString(),
          frequencyHz: before.frequenciesHz,
          valueDb: before.valuesDb,
          difference: settled && factorDifference(toCoreTable(before), core),
        },
      });
    }
    const using = await pathRevisionsWith(revised);
    preview.paths = using
      .filter(({ current }) => current)
      .map(({ path, revision }) => {
        return { id: path.publicId, code: path.code, name: path.name, revision: revision.revision };
      });
    return preview;
  });
}

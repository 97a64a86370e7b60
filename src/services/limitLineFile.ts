import { authorise, type Actor } from '@/auth/actor';
import { LINE_DETECTORS, type LineUnit } from '@/emc/kinds';
import { prepareLine } from '@/emc/limitLine';
import { limitDifference } from '@/emc/revisionDifference';
import type { LimitSegment } from '@/emc/types';
import { Invalid, TooLarge } from '@/errors';
import { detectorIn } from '@/ingest/detectors';
import { IngestError } from '@/ingest/ingestError';
import { betweenIsOpen, limitHoles, readLimitSegments } from '@/ingest/limitSegments';
import { recogniseLimitTable, type LimitTable } from '@/ingest/limitTable';
import { statedQuantity } from '@/ingest/stated';
import { readUpload } from '@/models/blobs';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { unitOfWork } from '@/models/unitOfWork';
import type { Upload } from '@/models/upload';
import type { LimitLineChoice, LimitLinePreview } from '@/schemas/tables';
import { lineSummary, setRefOf, setsNaming } from './limitLines';
import { lineView, toCoreLine } from './limitSets';
import { findUpload } from './sweepFiles';

const MOST_BYTES = 1024 * 1024;

export interface LimitFile {
  upload: Upload;
  table: LimitTable;
}

/** @throws IngestError with its line where the file holds no limit line */
export async function readLimitFile(fileId: string): Promise<LimitFile> {
  const upload = await findUpload(fileId);
  if (upload.bytes > MOST_BYTES) throw new TooLarge('A limit line takes at most 1 MB. One file holds one line.');
  return { upload, table: recogniseLimitTable(await readUpload(upload.id)) };
}

/** The revision that would be followed; the newest of its key. Invalid when it is none or has been followed. */
export async function revisedLine(id: string | null): Promise<LimitLineRevision | null> {
  if (id === null) return null;
  const row = await LimitLineRevision.findOne({ where: { publicId: id }, include: ['user'] });
  if (!row) throw new Invalid([{ pointer: '/revises', message: 'is not a limit line of this lab' }]);
  return row;
}

/** Every revision of a key, by public id. */
export async function revisionsOf(lineKey: string): Promise<LimitLineRevision[]> {
  return LimitLineRevision.findAll({ where: { lineKey }, order: [['revision', 'DESC']] });
}

function statedOf({ stated }: LimitTable): LimitLinePreview['stated'] {
  const detector = stated.detector ? detectorIn(stated.detector.value) : null;
  return {
    key: stated.key?.value.slice(0, 60) ?? null,
    name: stated.name?.value.slice(0, 200) ?? null,
    document: stated.document?.value.slice(0, 160) ?? null,
    class: stated.class?.value.slice(0, 120) ?? null,
    port: stated.port?.value.slice(0, 120) ?? null,
    detector: LINE_DETECTORS.find((one) => one === detector) ?? null,
    bandwidthHz: stated.bandwidth ? statedQuantity(stated.bandwidth.value, 'Hz') : null,
    distanceM: stated.distance ? statedQuantity(stated.distance.value, 'm') : null,
    source: stated.source?.value.slice(0, 300) ?? null,
    basis: stated.basis?.value.slice(0, 80) ?? null,
  };
}

const NOTHING: LimitLinePreview = {
  refusal: null,
  shape: null,
  encoding: null,
  delimiter: null,
  decimalMark: null,
  frequencyUnit: null,
  frequencyEvidence: null,
  proposedFrequencyUnit: null,
  unit: null,
  unitEvidence: null,
  rows: 0,
  stated: {
    ...{ key: null, name: null, document: null, class: null, port: null, detector: null },
    ...{ bandwidthHz: null, distanceM: null, source: null, basis: null },
  },
  questions: [],
  lines: [],
  segments: null,
  holes: [],
  before: null,
  sets: [],
};

/** What a held file would enter as a limit line, beside the revision before; nothing is stored. */
export async function previewLimitLine(actor: Actor | null, choice: LimitLineChoice): Promise<LimitLinePreview> {
  authorise(actor, 'table.preview');
  return unitOfWork(async () => {
    const before = await revisedLine(choice.revises);
    const sets = before ? await setsNaming((await revisionsOf(before.lineKey)).map((row) => row.publicId), { withdrawnAt: null }) : []; // prettier-ignore
    const known = { ...NOTHING, sets: sets.map(setRefOf) };
    const shown = before && { ...lineSummary(before, true), difference: null };
    let table: LimitTable;
    try {
      ({ table } = await readLimitFile(choice.fileId));
    } catch (error) {
      return { ...known, before: shown, refusal: refusalOf(error) };
    }
    const { shape, encoding, delimiter, decimalMark, frequencyUnit, frequencyEvidence, proposedFrequencyUnit } = table;
    const unit = choice.unit ?? table.unit;
    const questions: LimitLinePreview['questions'] = [];
    if (choice.frequencyUnit === null && frequencyUnit === null) questions.push('frequencyUnit');
    if (unit === null) questions.push('unit');
    if (choice.between === null && betweenIsOpen(table)) questions.push('between');
    const read: LimitLinePreview = {
      ...known,
      ...{ shape, encoding, delimiter, decimalMark, frequencyUnit, frequencyEvidence, proposedFrequencyUnit },
      unit: table.unit,
      unitEvidence: table.unitEvidence,
      rows: table.rows.length,
      stated: statedOf(table),
      questions,
      lines: table.lines.map(({ line, text }) => ({ line, text: text.slice(0, 200) })),
      before: shown,
    };
    if (questions.some((key) => key !== 'unit')) return read;
    let segments: LimitSegment[];
    try {
      segments = segmentsOf(table, choice);
    } catch (error) {
      return { ...read, refusal: refusalOf(error) };
    }
    const difference =
      before && (unit === null || unit === before.unit)
        ? limitDifference(toCoreLine(lineView(before)), coreOf(segments, before.unit as LineUnit))
        : null;
    return { ...read, segments, holes: limitHoles(segments), before: shown && { ...shown, difference } };
  });
}

const coreOf = (segments: LimitSegment[], unit: LineUnit) => {
  const line = { id: '', name: 'the limit line', detector: 'quasi-peak' as const, bandwidthHz: 1, distanceM: null };
  return { ...line, unit, segments };
};

/** @throws IngestError where the rows are no line that can be judged by */
export function segmentsOf(
  table: LimitTable,
  { frequencyUnit, between }: Pick<LimitLineChoice, 'frequencyUnit' | 'between'>,
) {
  const segments = readLimitSegments(table, { ...(frequencyUnit && { frequencyUnit }), ...(between && { between }) });
  prepareLine(coreOf(segments, 'dBuV'));
  return segments;
}

function refusalOf(error: unknown): NonNullable<LimitLinePreview['refusal']> {
  if (!(error instanceof IngestError)) throw error;
  const { line, found, expected, message } = error;
  return { line, found, expected, message };
}

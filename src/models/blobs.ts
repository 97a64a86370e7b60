import { QueryTypes } from 'sequelize';
import { database } from './database';
import { unpackFile } from './filePacking';
import { PhotoPart } from './photoPart';
import { SweepFilePart } from './sweepFilePart';
import { UploadPart } from './uploadPart';

/** Rows of blob tables stay below this, so that one never needs a larger packet than a server's default. */
export const PART_BYTES = 512 * 1024;

/** Writes parts of a file that was packed, the first of them with number `firstSeq`. */
export async function writeUploadParts(
  uploadId: number,
  parts: readonly Uint8Array<ArrayBuffer>[],
  firstSeq: number,
): Promise<void> {
  for (const [i, part] of parts.entries()) {
    await UploadPart.create({ uploadId, seq: firstSeq + i, part: Buffer.from(part.buffer, 0, part.length) });
  }
}

/**
 * Copies up to `most` parts of an upload, from number `firstSeq` on, into the insert-only table inside the server; the
 * bytes do not travel.
 * @returns how many there were
 */
export async function keepUploadParts(
  uploadId: number,
  sweepFileId: number,
  firstSeq: number,
  most: number,
): Promise<number> {
  const [, copied] = await database().query(
    `INSERT INTO sweep_file_parts (sweep_file_id, seq, part)
      SELECT ?, seq, part FROM upload_parts WHERE upload_id = ? AND seq >= ? AND seq < ?`,
    { replacements: [sweepFileId, uploadId, firstSeq, firstSeq + most], type: QueryTypes.INSERT },
  );
  return copied;
}

/** The packed parts of an upload, in order. */
export async function readUploadParts(uploadId: number): Promise<Buffer[]> {
  const parts = await UploadPart.findAll({ where: { uploadId }, order: [['seq', 'ASC']] });
  return parts.map((row) => row.part);
}

export async function readUpload(uploadId: number): Promise<Buffer> {
  return unpackFile(await readUploadParts(uploadId));
}

export async function readSweepFile(sweepFileId: number): Promise<Buffer> {
  const parts = await SweepFilePart.findAll({ where: { sweepFileId }, order: [['seq', 'ASC']] });
  return unpackFile(parts.map((row) => row.part));
}

/** A picture is compressed already; it is only cut. */
export async function writePhoto(photoId: number, size: PhotoPart['size'], bytes: Uint8Array): Promise<void> {
  for (let seq = 0; seq * PART_BYTES < bytes.length; seq++) {
    const part = Buffer.from(bytes.subarray(seq * PART_BYTES, (seq + 1) * PART_BYTES));
    await PhotoPart.create({ photoId, size, seq, part });
  }
}

export async function readPhoto(photoId: number, size: PhotoPart['size']): Promise<Buffer> {
  const parts = await PhotoPart.findAll({ where: { photoId, size }, order: [['seq', 'ASC']] });
  return Buffer.concat(parts.map((row) => row.part));
}

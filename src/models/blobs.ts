import { promisify } from 'node:util';
import { gunzip, gzip } from 'node:zlib';
import { QueryTypes } from 'sequelize';
import { database } from './database';
import { PhotoPart } from './photoPart';
import { SweepFilePart } from './sweepFilePart';
import { UploadPart } from './uploadPart';

const squeeze = promisify(gzip);
const expand = promisify(gunzip);

/** Rows of blob tables stay below this, so that one never needs a larger packet than a server's default. */
export const PART_BYTES = 512 * 1024;

/** The one writer of file bytes: compressed whole (level 6), then cut into rows of at most 512 KiB. */
export async function writeUpload(uploadId: number, bytes: Uint8Array): Promise<void> {
  const packed = await squeeze(bytes);
  for (let seq = 0; seq * PART_BYTES < packed.length; seq++) {
    await UploadPart.create({ uploadId, seq, part: packed.subarray(seq * PART_BYTES, (seq + 1) * PART_BYTES) });
  }
}

/** Copies the parts of an upload into the insert-only table inside the server; the bytes do not travel. */
export async function keepUpload(uploadId: number, sweepFileId: number): Promise<void> {
  await database().query(
    'INSERT INTO sweep_file_parts (sweep_file_id, seq, part) SELECT ?, seq, part FROM upload_parts WHERE upload_id = ?',
    { replacements: [sweepFileId, uploadId], type: QueryTypes.INSERT },
  );
}

export async function readUpload(uploadId: number): Promise<Buffer> {
  const parts = await UploadPart.findAll({ where: { uploadId }, order: [['seq', 'ASC']] });
  return expand(Buffer.concat(parts.map((row) => row.part)));
}

export async function readSweepFile(sweepFileId: number): Promise<Buffer> {
  const parts = await SweepFilePart.findAll({ where: { sweepFileId }, order: [['seq', 'ASC']] });
  return expand(Buffer.concat(parts.map((row) => row.part)));
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

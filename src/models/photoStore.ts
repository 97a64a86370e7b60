import { PhotoPart } from './photoPart';

/** Rows of blob tables stay below this, so that one never needs a larger packet than a server's default. */
export const PHOTO_PART_BYTES = 512 * 1024;

/** A picture is compressed already; it is only cut. */
export async function writePhoto(photoId: number, size: PhotoPart['size'], bytes: Uint8Array): Promise<void> {
  for (let seq = 0; seq * PHOTO_PART_BYTES < bytes.length; seq++) {
    const part = Buffer.from(bytes.subarray(seq * PHOTO_PART_BYTES, (seq + 1) * PHOTO_PART_BYTES));
    await PhotoPart.create({ photoId, size, seq, part });
  }
}

export async function readPhotoBytes(photoId: number, size: PhotoPart['size']): Promise<Buffer> {
  const parts = await PhotoPart.findAll({ where: { photoId, size }, order: [['seq', 'ASC']] });
  return Buffer.concat(parts.map((row) => row.part));
}

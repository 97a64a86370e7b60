import type { Actor } from '@/auth/actor';
import { NotFound } from '@/errors';
import { unpackFile } from '@/models/filePacking';
import { readUploadParts } from '@/models/blobs';
import { unitOfWork } from '@/models/unitOfWork';
import type { Upload } from '@/models/upload';
import type { ImportTask, ResultOf } from './importTasks';
import { isSmall, runApart, runHere } from './importWorkers';

/**
 * Runs a task on a held file: a small one here, a large one on a worker's thread, which may hold it already. Nothing of
 * the database is held meanwhile unless the caller is in a unit of work.
 * @throws {NotFound} when the file is not held any more or was never stored whole
 */
export async function onUpload<T extends ImportTask>(
  actor: Actor,
  { id, bytes, sha256 }: Pick<Upload, 'id' | 'bytes' | 'sha256'>,
  task: T,
): Promise<ResultOf<T>> {
  const stored = async () => {
    const parts = await unitOfWork(() => readUploadParts(id));
    if (parts.length === 0) throw new NotFound('uploaded file (it is held for a day)');
    return parts;
  };
  if (!isSmall(bytes)) {
    // The driver's buffers are views of larger ones; only memory of its own can be handed over.
    return runApart(actor.userId, task, sha256, async () => ({
      parts: (await stored()).map((part) => new Uint8Array(part)),
      bytes,
    }));
  }
  const whole = await unpackFile(await stored());
  if (whole.length !== bytes) throw new NotFound('uploaded file: it was not stored whole; send it again');
  return runHere(whole, task);
}

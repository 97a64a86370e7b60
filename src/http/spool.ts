import { randomUUID } from 'node:crypto';
import { open, unlink, type FileHandle } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Actor } from '@/auth/actor';
import { Throttled, Unauthenticated } from '@/errors';
import { checkHour, takeImportTurn, type ImportTurn } from '@/services/importLimits';
import type { SweepFileToHold } from '@/services/sweepFiles';
import { receiveForm, SWEEP_FILE } from './multipart';

/** A smaller file stays in memory. */
const IN_MEMORY_BYTES = 1024 * 1024;
/** Files this process takes in at once; each may take 100 MB of the temporary directory. */
export const MAX_SPOOLS_AT_ONCE = 12;
let spooling = 0;

/**
 * Where a file waits until it was read: memory, or a file of the temporary directory (TMPDIR) that has no name any
 * more. Its name is taken away before the first byte is written, so that the system frees it when this process closes
 * it or dies; there is nothing to clean up and nothing that another request could depend on.
 */
class Spool {
  private chunks: Buffer[] = [];
  private length = 0;
  private file: FileHandle | null = null;

  async write(chunk: Buffer): Promise<void> {
    this.length += chunk.length;
    if (this.file === null && this.length <= IN_MEMORY_BYTES) {
      this.chunks.push(chunk);
      return;
    }
    if (this.file === null) {
      const name = path.join(tmpdir(), `stillfield-${randomUUID()}`);
      this.file = await open(name, 'wx+', 0o600);
      await unlink(name);
      for (const before of this.chunks.splice(0)) await this.file.writeFile(before);
    }
    await this.file.writeFile(chunk);
  }

  get source(): SweepFileToHold['source'] {
    if (this.file) return { fd: this.file.fd, bytes: this.length };
    return { whole: Buffer.concat(this.chunks, this.length) };
  }

  async close(): Promise<void> {
    this.chunks = [];
    await this.file?.close();
  }
}

export interface SpooledFile extends SweepFileToHold {
  fields: Record<string, string>;
  /** Lets go of the spool and of the person's turn. */
  close(): Promise<void>;
}

/**
 * Takes in one sweep file (at most 100 MB) in one of the person's turns, into a spool.
 * @throws {Throttled} when the person or this process has as many under way as it may, or sent an hour's worth
 */
export async function receiveSweepFile(request: Request, actor: Actor | null): Promise<SpooledFile> {
  if (!actor) throw new Unauthenticated();
  if (spooling >= MAX_SPOOLS_AT_ONCE) {
    throw new Throttled(5, 'Many files are being received at this moment. Send this one again shortly.');
  }
  spooling += 1;
  const spool = new Spool();
  let turn: ImportTurn | null = null;
  const close = async () => {
    spooling -= 1;
    await spool.close();
    await turn?.giveBack();
  };
  try {
    turn = await takeImportTurn(actor);
    await checkHour(actor, Number(request.headers.get('content-length') ?? 0));
    const { name, sha256, fields } = await receiveForm(request, SWEEP_FILE, (chunk) => spool.write(chunk));
    return { name, sha256, fields, source: spool.source, close };
  } catch (error) {
    await close();
    throw error;
  }
}

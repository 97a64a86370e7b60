import type { z } from 'zod';
import type { Actor } from '@/auth/actor';
import type { Upload } from '@/models/upload';
import type { keepSweep } from '@/schemas/sweep';

/** Remembers how a file of this shape was read, to propose it for the next one. Call inside the unit that keeps it. */
export async function rememberShape(
  _actor: Actor,
  _upload: Upload,
  _body: z.infer<typeof keepSweep>,
  _at: Date,
): Promise<void> {}

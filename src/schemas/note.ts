import { z } from 'zod';
import { instant, pageOf, pageQuery, publicId } from './common';
import { operation } from './operation';

/** A note hangs on one record. */
const about = {
  jobId: publicId.optional(),
  sampleId: publicId.optional(),
  sweepId: publicId.optional(),
};
const one = (value: { jobId?: string; sampleId?: string; sweepId?: string }) =>
  [value.jobId, value.sampleId, value.sweepId].filter((id) => id !== undefined).length === 1;
const NAMES_ONE = 'names one of jobId, sampleId and sweepId';

/** Who reads it: the lab's people alone, or the client's designers too. */
export const audience = z.enum(['lab', 'client']);

export const noteView = z.strictObject({
  id: publicId,
  text: z.string(),
  audience,
  by: z.string(),
  /** The client of a designer who wrote it; null for the lab's own people. */
  from: z.string().nullable(),
  at: instant,
});
export type NoteView = z.infer<typeof noteView>;

export const noteBody = z
  .strictObject({ ...about, text: z.string().trim().min(1, 'is empty').max(2000), audience })
  .refine(one, NAMES_ONE);
export const noteQuery = z.strictObject({ ...pageQuery.shape, ...about }).refine(one, NAMES_ONE);

export const listNotes = operation({
  id: 'listNotes',
  method: 'GET',
  path: '/api/notes',
  summary: 'Notes on a job, a sample or a run, newest first',
  permission: 'note.list',
  status: 200,
  query: noteQuery,
  reply: pageOf(noteView),
});
export const createNote = operation({
  id: 'createNote',
  method: 'POST',
  path: '/api/notes',
  summary: 'Write a note on a job, a sample or a run; it is never changed',
  permission: 'note.write',
  status: 201,
  body: noteBody,
  reply: noteView,
  idempotent: true,
});

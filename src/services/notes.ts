import type { z } from 'zod';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import { Note } from '@/models/note';
import type { Organisation } from '@/models/organisation';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { noteBody, noteQuery, NoteView } from '@/schemas/note';
import { recordChange } from './audit';
import { findJob } from './jobs';
import { olderThan, pageFrom, type Page } from './paging';
import { findRun } from './runs';
import { findSample } from './samples';

type Writer = User & { organisation: Organisation };
const WRITER = { association: 'user', include: ['organisation'] };

function view(row: Note): NoteView {
  const { user } = row as Note & { user: Writer };
  return {
    id: row.publicId,
    text: row.text,
    audience: row.audience,
    by: user.name,
    from: user.role === 'designer' ? user.organisation.name : null,
    at: row.createdAt.toISOString(),
  };
}

interface About {
  jobId?: string;
  sampleId?: string;
  sweepId?: string;
}

/** The record a note hangs on, which the actor may see, with its column, its client and its audit scope. */
async function subjectOf(actor: Actor, about: About) {
  if (about.sweepId) {
    const run = await findRun(actor, about.sweepId);
    const { job } = run.state.sample;
    return { where: { sweepId: run.id }, type: 'sweep', publicId: run.publicId, job };
  }
  if (about.sampleId) {
    const sample = await findSample(actor, about.sampleId);
    return { where: { sampleId: sample.id }, type: 'sample', publicId: sample.publicId, job: sample.job };
  }
  const job = await findJob(actor, about.jobId!);
  return { where: { jobId: job.id }, type: 'job', publicId: job.publicId, job };
}

/** Newest first. A designer reads what is for the client, and nothing written while the record was another client's. */
export async function listNotes(actor: Actor | null, query: z.infer<typeof noteQuery>): Promise<Page<NoteView>> {
  authorise(actor, 'note.list');
  const own = visibleOrganisation(actor);
  return unitOfWork(async () => {
    const { where } = await subjectOf(actor, query);
    const rows = await Note.findAll({
      where: {
        ...where,
        ...olderThan(query),
        ...(own !== null && { audience: 'client', organisationId: own }),
      },
      include: [WRITER],
      order: [['id', 'DESC']],
      limit: query.limit + 1,
    });
    return pageFrom(rows, query, view);
  });
}

/** A designer's note is always for both sides. */
export async function createNote(
  actor: Actor | null,
  body: z.infer<typeof noteBody>,
  at = new Date(),
): Promise<NoteView> {
  authorise(actor, 'note.write');
  const audience = actor.role === 'designer' ? 'client' : body.audience;
  return unitOfWork(async () => {
    const { where, type, publicId, job } = await subjectOf(actor, body);
    const row = await Note.create({
      ...where,
      publicId: newPublicId(),
      organisationId: job.organisationId,
      audience,
      text: body.text,
      userId: actor.userId,
      createdAt: at,
    });
    recordChange(actor, {
      scope: `job-${job.publicId}`,
      action: audience === 'client' ? 'note written for the client' : 'note written',
      subjectType: type,
      subjectId: publicId,
      before: null,
      after: { note: row.publicId, audience, text: body.text },
      at,
    });
    await row.reload({ include: [WRITER] });
    return view(row);
  });
}

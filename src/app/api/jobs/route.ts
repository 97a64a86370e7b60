import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { createJob, listJobs } from '@/services/jobs';

export const GET = handle(operations.listJobs, ({ actor, query }) => listJobs(actor, query));
export const POST = handle(operations.createJob, ({ actor, body }) => createJob(actor, body));

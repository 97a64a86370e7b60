import { z } from 'zod';
import { decisionRule, instant, organisationRef, pageOf, pageQuery, publicId, version } from './common';
import { operation } from './operation';

export const idParams = z.strictObject({ id: publicId });
const text = (max: number) => z.string().trim().min(1, 'is needed').max(max, `takes at most ${max} characters`);
const optionalText = (max: number) => z.string().trim().max(max, `takes at most ${max} characters`).default('');

/* Organisations: the lab and its clients. */

export const organisationView = z.strictObject({ id: publicId, name: z.string(), kind: z.enum(['lab', 'client']) });
export const listOrganisations = operation({
  id: 'listOrganisations',
  method: 'GET',
  path: '/api/organisations',
  summary: 'Client organisations of the lab',
  permission: 'organisation.list',
  status: 200,
  query: pageQuery,
  reply: pageOf(organisationView),
});

/* Products: what a client develops. */

export const productView = z.strictObject({
  id: publicId,
  version,
  code: z.string(),
  name: z.string(),
  description: z.string(),
  organisation: organisationRef,
});
export type ProductView = z.infer<typeof productView>;
export const createProductBody = z.strictObject({
  organisationId: publicId,
  code: text(40),
  name: text(120),
  description: optionalText(2000),
});
export const changeProductBody = z.strictObject({
  code: text(40).optional(),
  name: text(120).optional(),
  description: z.string().trim().max(2000).optional(),
});
export const listProducts = operation({
  id: 'listProducts',
  method: 'GET',
  path: '/api/products',
  summary: 'Products, newest first',
  permission: 'product.list',
  status: 200,
  query: pageQuery,
  reply: pageOf(productView),
});
export const readProduct = operation({
  id: 'readProduct',
  method: 'GET',
  path: '/api/products/{id}',
  summary: 'One product',
  permission: 'product.read',
  status: 200,
  params: idParams,
  reply: productView,
});
export const createProduct = operation({
  id: 'createProduct',
  method: 'POST',
  path: '/api/products',
  summary: 'Enter a product of a client organisation',
  permission: 'product.create',
  status: 201,
  body: createProductBody,
  reply: productView,
  idempotent: true,
});
export const changeProduct = operation({
  id: 'changeProduct',
  method: 'PATCH',
  path: '/api/products/{id}',
  summary: 'Correct a product',
  permission: 'product.change',
  status: 200,
  params: idParams,
  body: changeProductBody,
  reply: productView,
  ifMatch: true,
});

/* Jobs. */

export const jobView = z.strictObject({
  id: publicId,
  version,
  number: z.string(),
  title: z.string(),
  organisation: organisationRef,
  product: z.strictObject({ id: publicId, code: z.string(), name: z.string() }),
  decisionRule,
  state: z.enum(['open', 'declined', 'closed']),
  stateReason: z.string().nullable(),
  createdAt: instant,
  samples: z.int(),
});
export type JobView = z.infer<typeof jobView>;
export const createJobBody = z.strictObject({
  productId: publicId,
  title: text(160),
  decisionRule: decisionRule.default('guarded-by-u'),
});
export const changeJobBody = z.strictObject({
  title: text(160).optional(),
  state: z.enum(['open', 'declined', 'closed']).optional(),
  stateReason: z.string().trim().max(500).nullable().optional(),
  /** Runs judged before keep the rule they were judged by until they are judged again. */
  decisionRule: decisionRule.optional(),
});
export const listJobs = operation({
  id: 'listJobs',
  method: 'GET',
  path: '/api/jobs',
  summary: 'Jobs, newest first',
  permission: 'job.list',
  status: 200,
  query: pageQuery,
  reply: pageOf(jobView),
});
export const readJob = operation({
  id: 'readJob',
  method: 'GET',
  path: '/api/jobs/{id}',
  summary: 'One job',
  permission: 'job.read',
  status: 200,
  params: idParams,
  reply: jobView,
});
export const createJob = operation({
  id: 'createJob',
  method: 'POST',
  path: '/api/jobs',
  summary: 'Open a job for a product',
  permission: 'job.create',
  status: 201,
  body: createJobBody,
  reply: jobView,
  idempotent: true,
});
export const changeJob = operation({
  id: 'changeJob',
  method: 'PATCH',
  path: '/api/jobs/{id}',
  summary: 'Rename, close, decline or reopen a job, or choose its decision rule',
  permission: 'job.change',
  status: 200,
  params: idParams,
  body: changeJobBody,
  reply: jobView,
  ifMatch: true,
});

/* Samples and their modification states. */

export const stateView = z.strictObject({
  id: publicId,
  version,
  label: z.string(),
  description: z.string(),
  planned: z.boolean(),
  runs: z.int(),
});
export const sampleView = z.strictObject({
  id: publicId,
  version,
  code: z.string(),
  serial: z.string(),
  firmware: z.string(),
  description: z.string(),
  organisation: organisationRef,
  job: z.strictObject({ id: publicId, number: z.string(), title: z.string() }),
  product: z.strictObject({ id: publicId, code: z.string(), name: z.string() }),
  states: z.array(stateView),
});
export type SampleView = z.infer<typeof sampleView>;
export const createSampleBody = z.strictObject({
  serial: text(80),
  firmware: optionalText(80),
  description: optionalText(2000),
});
export const changeSampleBody = z.strictObject({
  serial: text(80).optional(),
  firmware: z.string().trim().max(80).optional(),
  description: z.string().trim().max(2000).optional(),
});
export const createStateBody = z.strictObject({ description: text(300), planned: z.boolean().default(false) });
export const changeStateBody = z.strictObject({ description: text(300).optional(), planned: z.boolean().optional() });
export const listSamples = operation({
  id: 'listSamples',
  method: 'GET',
  path: '/api/samples',
  summary: 'Samples with their modification states, newest first',
  permission: 'sample.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, jobId: publicId.optional() }),
  reply: pageOf(sampleView),
});
export const readSample = operation({
  id: 'readSample',
  method: 'GET',
  path: '/api/samples/{id}',
  summary: 'One sample with its modification states',
  permission: 'sample.read',
  status: 200,
  params: idParams,
  reply: sampleView,
});
export const createSample = operation({
  id: 'createSample',
  method: 'POST',
  path: '/api/jobs/{id}/samples',
  summary: 'Enter a sample into a job; it starts in state M0',
  permission: 'sample.create',
  status: 201,
  params: idParams,
  body: createSampleBody,
  reply: sampleView,
  idempotent: true,
});
export const changeSample = operation({
  id: 'changeSample',
  method: 'PATCH',
  path: '/api/samples/{id}',
  summary: 'Correct a sample',
  permission: 'sample.change',
  status: 200,
  params: idParams,
  body: changeSampleBody,
  reply: sampleView,
  ifMatch: true,
});
export const createState = operation({
  id: 'createState',
  method: 'POST',
  path: '/api/samples/{id}/states',
  summary: 'Add the next modification state of a sample',
  permission: 'state.create',
  status: 201,
  params: idParams,
  body: createStateBody,
  reply: sampleView,
  idempotent: true,
});
export const changeState = operation({
  id: 'changeState',
  method: 'PATCH',
  path: '/api/states/{id}',
  summary: 'Correct the description of a modification state, or mark it as fitted',
  permission: 'state.change',
  status: 200,
  params: idParams,
  body: changeStateBody,
  reply: sampleView,
  ifMatch: true,
});

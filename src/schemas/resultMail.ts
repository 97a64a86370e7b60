import { z } from 'zod';
import { instant, pageOf, pageQuery, person, publicId } from './common';
import { mailStateView } from './mailState';
import { operation } from './operation';
import type { CandidateView, SweepView } from './sweep';

/* The result e-mail: how one modification state of a sample stands, sent to designers of the sample's own client. */

/** One port in the e-mail. */
export interface PortResult {
  port: SweepView['port'];
  verdict: SweepView['portVerdict']['verdict'];
  missing: SweepView['portVerdict']['missing'];
  /** The governing emission with the limit line it hangs from; null when nothing stood out. */
  worst:
    | (Pick<CandidateView, 'kind' | 'frequencyHz' | 'fromHz' | 'toHz' | 'marginDb' | 'uncertaintyDb'> & {
        lineName: string;
        run: string;
      })
    | null;
  limitSets: { name: string; revision: number; lines: { name: string; revision: number }[] }[];
  runs: string[];
}

/** All that the e-mail says; a figure is as it was evaluated and is rounded where it is written. */
export interface StateResult {
  lab: string;
  sender: string;
  product: { code: string; name: string };
  sample: { code: string; serial: string };
  state: { label: string; description: string };
  job: { number: string; title: string };
  /** Worst first. */
  ports: PortResult[];
  leftOut: { trials: number; voided: number };
  partial: { run: string; readToHz: number }[];
  /** What the sender adds in their own words; empty for nothing. */
  note: string;
  /** The state's sheet, which asks for a sign-in; no secret in it. */
  link: string;
}

export const resultMailView = z.strictObject({
  id: publicId,
  /** The same for every message of one sending. */
  sendingId: publicId,
  sample: z.strictObject({ id: publicId, code: z.string() }),
  state: z.strictObject({ id: publicId, label: z.string() }),
  to: person,
  by: person,
  subject: z.string(),
  text: z.string(),
  /** The evaluations it rests on. */
  evaluationIds: z.array(publicId),
  at: instant,
  /** null when the outbox no longer knows. */
  mail: mailStateView.nullable(),
});
export type ResultMailView = z.infer<typeof resultMailView>;

const asked = z.strictObject({
  stateId: publicId,
  recipientIds: z.array(publicId).min(1, 'names at least one designer').max(20, 'names at most 20 designers'),
  note: z.string().trim().max(1000, 'takes at most 1000 characters').default(''),
});
export const previewResultMailBody = asked;
export const sendResultMailBody = z.strictObject({
  ...asked.shape,
  /** From the preview: what is sent is what was shown, or nothing is. */
  digest: z.string().regex(/^[0-9a-f]{64}$/, 'is the digest of a preview'),
});
export const resultMailPreview = z.strictObject({
  to: z.array(z.strictObject({ id: publicId, name: z.string(), address: z.string() })),
  subject: z.string(),
  text: z.string(),
  html: z.string(),
  digest: z.string(),
});
export type ResultMailPreview = z.infer<typeof resultMailPreview>;

export const listResultMails = operation({
  id: 'listResultMails',
  method: 'GET',
  path: '/api/result-mails',
  summary: 'Result e-mails and what became of them, newest first',
  permission: 'result-mail.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, sampleId: publicId.optional(), stateId: publicId.optional() }),
  reply: pageOf(resultMailView),
});
export const listResultMailRecipients = operation({
  id: 'listResultMailRecipients',
  method: 'GET',
  path: '/api/result-mails/recipients',
  summary: 'Who may receive the result of a state: enabled designers of the sample’s client',
  permission: 'result-mail.send',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, stateId: publicId }),
  reply: pageOf(person),
});
export const previewResultMail = operation({
  id: 'previewResultMail',
  method: 'POST',
  path: '/api/result-mails/preview',
  summary: 'The result e-mail exactly as it would be sent; nothing is sent or stored',
  permission: 'result-mail.send',
  status: 200,
  body: previewResultMailBody,
  reply: resultMailPreview,
});
export const sendResultMail = operation({
  id: 'sendResultMail',
  method: 'POST',
  path: '/api/result-mails',
  summary: 'Send the previewed result e-mail to designers of the sample’s client, one message each',
  permission: 'result-mail.send',
  status: 201,
  body: sendResultMailBody,
  reply: z.strictObject({ sendingId: publicId, items: z.array(resultMailView) }),
  idempotent: true,
});

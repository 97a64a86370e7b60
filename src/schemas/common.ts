import { z } from 'zod';
import * as kinds from '@/emc/kinds';

export const publicId = z.string().regex(/^[0-9a-z]{16}$/, 'is not an identifier of this lab');
export const instant = z.iso.datetime({ offset: true });
export const day = z.iso.date();
export const version = z.int().min(1);

export const detector = z.enum(kinds.DETECTORS);
export const levelUnit = z.enum(kinds.LEVEL_UNITS);
export const lineUnit = z.enum(kinds.LINE_UNITS);
export const lineDetector = z.enum(kinds.LINE_DETECTORS);
export const verdict = z.enum(kinds.VERDICTS);
export const purpose = z.enum(kinds.PURPOSES);
export const port = z.enum(kinds.PORTS);
export const mainsLine = z.enum(kinds.MAINS_LINES);
export const polarisation = z.enum(kinds.POLARISATIONS);
export const decisionRule = z.enum(kinds.DECISION_RULES);
export const role = z.enum(['manager', 'technician', 'designer']);

/** Keyset page: `after` is the cursor of the page before, `next` the one to ask for, null at the end. */
export const pageQuery = z.strictObject({
  limit: z.coerce.number().int().min(1).max(200).default(50),
  after: z.string().max(200).optional(),
});
export function pageOf<T extends z.ZodType>(item: T) {
  return z.strictObject({ items: z.array(item), next: z.string().nullable() });
}
export const person = z.strictObject({ id: publicId, name: z.string() });
export const organisationRef = z.strictObject({ id: publicId, name: z.string() });

export type Detector = z.infer<typeof detector>;
export type LevelUnit = z.infer<typeof levelUnit>;
export type LineUnit = z.infer<typeof lineUnit>;
export type LineDetector = z.infer<typeof lineDetector>;
export type Verdict = z.infer<typeof verdict>;
export type Port = z.infer<typeof port>;
export type Purpose = z.infer<typeof purpose>;
export type MainsLine = z.infer<typeof mainsLine>;
export type Polarisation = z.infer<typeof polarisation>;

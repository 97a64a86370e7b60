import type { z } from 'zod';
import type { Upload } from '@/models/upload';
import type { keepSweep } from '@/schemas/sweep';
import { recognitionOf } from './sweepFiles';

/** What recognition remarked, and where a person read the file otherwise than it says. */
export function remarksOn(upload: Upload, body: z.infer<typeof keepSweep>): string[] {
  const recognition = recognitionOf(upload);
  const remarks = recognition.remarks.map(({ text, line }) => (line === null ? text : `Line ${line}: ${text}`));
  if (body.valuesHold === 'receiver-input' && !body.alreadyCorrected?.length) {
    for (const { what, line } of recognition.correctedFor) {
      remarks.push(`Line ${line} says that the values hold ${what}; nothing was left out for it, by hand.`);
    }
  }
  const { unit } = recognition.frequency;
  if (unit !== null && unit !== body.frequencyUnit) {
    remarks.push(`The file states its frequencies in ${unit}; they were read in ${body.frequencyUnit} by hand.`);
  }
  for (const trace of body.traces) {
    const stated = recognition.traces.find(({ index }) => index === trace.index);
    if (stated?.unit && stated.unit !== trace.unit) {
      remarks.push(`The file states ${stated.unit} for ${trace.name}; it was read as ${trace.unit} by hand.`);
    }
    const { rbwHz } = recognition.settings;
    if (rbwHz !== null && trace.rbwHz !== rbwHz) {
      remarks.push(
        `The file states an RBW of ${rbwHz} Hz; ${trace.name} was said to have ${trace.rbwHz ?? 'an unknown one'}.`,
      );
    }
    if (stated?.detector && stated.detector !== trace.detector) {
      remarks.push(
        `The file states a ${stated.detector} detector for ${trace.name}; it was read as ${trace.detector} by hand.`,
      );
    }
  }
  return remarks;
}

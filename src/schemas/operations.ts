import * as bench from './bench';
import * as job from './job';
import type { Operation } from './operation';
import * as session from './session';
import * as sweep from './sweep';
import * as sweepFile from './sweepFile';

function isOperation(value: unknown): value is Operation {
  return typeof value === 'object' && value !== null && 'method' in value && 'path' in value && 'permission' in value;
}

/** Every operation of the API, in the order of their declarations. */
export const OPERATIONS: readonly Operation[] = [session, job, bench, sweepFile, sweep].flatMap((module) =>
  Object.values(module as Record<string, unknown>).filter(isOperation),
);

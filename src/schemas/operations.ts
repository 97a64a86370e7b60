import * as bench from './bench';
import * as booking from './booking';
import * as clock from './clock';
import * as comparison from './comparison';
import * as job from './job';
import * as finals from './finals';
import type { Operation } from './operation';
import * as find from './find';
import * as custody from './custody';
import * as note from './note';
import * as paths from './paths';
import * as people from './people';
import * as receiver from './receiver';
import * as resultMail from './resultMail';
import * as retest from './retest';
import * as runActs from './runActs';
import * as session from './session';
import * as setup from './setup';
import * as sources from './sources';
import * as sweep from './sweep';
import * as sweepFile from './sweepFile';
import * as tables from './tables';

function isOperation(value: unknown): value is Operation {
  return typeof value === 'object' && value !== null && 'method' in value && 'path' in value && 'permission' in value;
}

/** Every operation of the API, in the order of their declarations. */
export const OPERATIONS: readonly Operation[] = [
  session,
  people,
  job,
  clock,
  bench,
  tables,
  paths,
  sweepFile,
  sweep,
  runActs,
  receiver,
  sources,
  comparison,
  setup,
  retest,
  finals,
  custody,
  note,
  find,
  booking,
  resultMail,
].flatMap((module) => Object.values(module as Record<string, unknown>).filter(isOperation));

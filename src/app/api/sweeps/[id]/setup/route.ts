import { handle } from '@/http/handle';
import * as operations from '@/schemas/setup';
import { readSetup, writeSetup } from '@/services/setup';

export const GET = handle(operations.readSetup, ({ actor, params }) => readSetup(actor, params.id));
export const POST = handle(operations.writeSetup, ({ actor, params, body }) => writeSetup(actor, params.id, body));

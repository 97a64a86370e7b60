import { handle } from '@/http/handle';
import * as operations from '@/schemas/sources';
import { readLikelySources } from '@/services/likelySources';

export const GET = handle(operations.readLikelySources, ({ actor, params }) => readLikelySources(actor, params.id));

import { handle } from '@/http/handle';
import * as operations from '@/schemas/tables';
import { previewLimitLine } from '@/services/limitLineFile';

export const POST = handle(operations.previewLimitLine, ({ actor, body }) => previewLimitLine(actor, body));

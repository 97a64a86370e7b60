import { handle } from '@/http/handle';
import { previewFinals as operation } from '@/schemas/finals';
import { previewFinals } from '@/services/previewFinals';

export const POST = handle(operation, ({ actor, body }) => previewFinals(actor, body));

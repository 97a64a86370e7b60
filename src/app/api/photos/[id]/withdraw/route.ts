import { handle } from '@/http/handle';
import * as operations from '@/schemas/setup';
import { withdrawPhoto } from '@/services/photos';

export const POST = handle(operations.withdrawPhoto, ({ actor, params, version, body }) =>
  withdrawPhoto(actor, params.id, version, body),
);

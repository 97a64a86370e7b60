import { handle } from '@/http/handle';
import * as operations from '@/schemas/setup';
import { changePhoto, readPhoto } from '@/services/photos';

export const GET = handle(operations.readPhoto, ({ actor, params }) => readPhoto(actor, params.id));
export const PATCH = handle(operations.changePhoto, ({ actor, params, version, body }) =>
  changePhoto(actor, params.id, version, body),
);

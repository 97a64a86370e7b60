import { handle } from '@/http/handle';
import { receivePhoto } from '@/http/image';
import * as operations from '@/schemas/setup';
import { addPhoto, listPhotos } from '@/services/photos';

export const GET = handle(operations.listPhotos, ({ actor, params, query }) => listPhotos(actor, params.id, query));
export const POST = handle(
  operations.addPhoto,
  ({ actor, params, body, file }) => addPhoto(actor, params.id, file, body.caption),
  receivePhoto,
);

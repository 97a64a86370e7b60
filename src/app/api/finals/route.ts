import { handle } from '@/http/handle';
import { keepFinals as operation } from '@/schemas/finals';
import { dropFinals, publishFinals, stageFinals } from '@/services/keepFinals';

export const POST = handle(operation, {
  stage: ({ actor, body }) => stageFinals(actor, body),
  publish: ({ actor, body }, staged) => publishFinals(actor, body, staged),
  drop: dropFinals,
});

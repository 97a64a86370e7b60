import { openApiDocument } from '@/http/openapi';
import { OPERATIONS } from '@/schemas/operations';

export function GET(): Response {
  return Response.json(openApiDocument(OPERATIONS));
}

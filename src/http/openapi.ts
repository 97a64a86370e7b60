import { z } from 'zod';
import { env } from '@/config/env';
import { PERMISSIONS } from '@/auth/permissions';
import { sessionCookieName } from '@/auth/session';
import type { Operation } from '@/schemas/operation';

type Json = Record<string, unknown>;

const jsonSchema = (schema: z.ZodType, io: 'input' | 'output'): Json => {
  const { $schema: _, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any' }) as Json;
  return rest;
};

function parameters(op: Operation): Json[] {
  const list: Json[] = [];
  const add = (schema: z.ZodType | undefined, where: 'path' | 'query') => {
    if (!schema) return;
    const shape = jsonSchema(schema, 'input') as { properties?: Record<string, Json>; required?: string[] };
    for (const [name, of] of Object.entries(shape.properties ?? {})) {
      list.push({ name, in: where, required: where === 'path' || (shape.required ?? []).includes(name), schema: of });
    }
  };
  add(op.params, 'path');
  add(op.query, 'query');
  const header = (name: string, required: boolean, description: string) =>
    list.push({ name, in: 'header', required, description, schema: { type: 'string' } });
  if (op.idempotent || (op.ifMatch && op.method === 'POST'))
    header('Idempotency-Key', false, '8 to 80 visible ASCII characters; a repeat answers the first reply');
  if (op.ifMatch) header('If-Match', true, 'The version of the record as your last read showed it');
  return list;
}

function body(op: Operation): Json | undefined {
  if (op.upload) {
    const fields = op.body ? (jsonSchema(op.body, 'input') as { properties?: Json }).properties : {};
    const schema = {
      type: 'object',
      required: ['file'],
      properties: { file: { type: 'string', format: 'binary' }, ...fields },
    };
    return { required: true, content: { 'multipart/form-data': { schema } } };
  }
  return op.body && { required: true, content: { 'application/json': { schema: jsonSchema(op.body, 'input') } } };
}

/** A token is offered only where some scope of it is enough. */
function security(op: Operation): Json[] {
  if (!op.permission) return [];
  return [{ session: [] }, ...(PERMISSIONS[op.permission].token === null ? [] : [{ token: [] }])];
}

/** The OpenAPI 3.1 description of the API, made from the operations themselves. */
export function openApiDocument(operations: readonly Operation[]): Json {
  const paths: Record<string, Json> = {};
  for (const op of operations) {
    const reply = op.download
      ? { 'application/octet-stream': { schema: { type: 'string', format: 'binary' } } }
      : op.reply && { 'application/json': { schema: jsonSchema(op.reply, 'output') } };
    (paths[op.path] ??= {})[op.method.toLowerCase()] = {
      operationId: op.id,
      summary: op.summary,
      ...(op.permission && { description: `Roles: ${PERMISSIONS[op.permission].roles.join(', ')}.` }),
      security: security(op),
      parameters: parameters(op),
      ...(body(op) && { requestBody: body(op) }),
      responses: {
        [op.status]: { description: 'Done', ...(reply && { content: reply }) },
        default: { description: 'RFC 9457 problem', content: { 'application/problem+json': { schema: PROBLEM } } },
      },
    };
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Stillfield', version: '1', description: 'The working record of an EMC pre-compliance lab.' },
    servers: [{ url: env().APP_ORIGIN }],
    paths,
    components: {
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: sessionCookieName() },
        token: { type: 'http', scheme: 'bearer' },
      },
    },
  };
}

const PROBLEM = {
  type: 'object',
  required: ['type', 'title', 'status', 'detail'],
  properties: {
    type: { type: 'string' },
    title: { type: 'string' },
    status: { type: 'integer' },
    detail: { type: 'string' },
    errors: {
      type: 'array',
      items: { type: 'object', properties: { pointer: { type: 'string' }, message: { type: 'string' } } },
    },
  },
};

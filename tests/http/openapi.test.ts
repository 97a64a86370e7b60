import { PERMISSIONS } from '@/auth/permissions';
import type { openApiDocument } from '@/http/openapi';
import { OPERATIONS } from '@/schemas/operations';

interface Document {
  paths: Record<string, Record<string, { operationId: string; security: Record<string, unknown>[] }>>;
  components: { securitySchemes: { session: { name: string } } };
}

function documentAt(origin: string): Document {
  jest.resetModules();
  const before = { ...process.env };
  Object.assign(process.env, {
    DATABASE_URL: 'mysql://nobody@127.0.0.1/none',
    SESSION_SECRET: 'a session secret that only the tests use',
    APP_ORIGIN: origin,
  });
  try {
    const fresh = jest.requireActual<{ openApiDocument: typeof openApiDocument }>('@/http/openapi');
    return fresh.openApiDocument(OPERATIONS) as unknown as Document;
  } finally {
    process.env = before;
  }
}

test('the session cookie has the name it is set under, with TLS and without', () => {
  expect(documentAt('http://localhost:3000').components.securitySchemes.session.name).toBe('stillfield');
  expect(documentAt('https://lab.example').components.securitySchemes.session.name).toBe('__Host-stillfield');
});

test('a token is offered exactly where the table of permissions lets one in', () => {
  const operations = Object.values(documentAt('http://localhost:3000').paths).flatMap((of) => Object.values(of));
  expect(operations).toHaveLength(OPERATIONS.length);
  for (const { operationId, security } of operations) {
    const { permission } = OPERATIONS.find((op) => op.id === operationId)!;
    const schemes = security.flatMap((one) => Object.keys(one));
    const token = permission && PERMISSIONS[permission].token !== null ? ['token'] : [];
    expect([operationId, schemes]).toEqual([operationId, permission ? ['session', ...token] : []]);
  }
  const offered = operations.filter(({ security }) => security.some((one) => 'token' in one));
  expect(offered.map(({ operationId }) => operationId)).toContain('keepSweep');
  expect(offered.map(({ operationId }) => operationId)).not.toContain('createJob');
});

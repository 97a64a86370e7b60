import { WRITES } from '@/app/(lab)/jobs/writes';
import { OPERATIONS } from '@/schemas/operations';

test.each(Object.entries(WRITES))('%s is sent as its operation declares it', (id, { method, path }) => {
  const declared = OPERATIONS.find((operation) => operation.id === id);
  expect(declared).toMatchObject({ method, path });
});

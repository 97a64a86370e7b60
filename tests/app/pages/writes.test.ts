import { TABLE_WRITES } from '@/app/(lab)/equipment/writes';
import { WRITES } from '@/app/(lab)/jobs/writes';
import { SETUP_WRITES } from '@/app/(lab)/sweeps/[id]/setUpWrites';
import { OPERATIONS } from '@/schemas/operations';

test.each(Object.entries({ ...WRITES, ...TABLE_WRITES, ...SETUP_WRITES }))(
  '%s is sent as its operation declares it',
  (id, { method, path }) => {
    const declared = OPERATIONS.find((operation) => operation.id === id);
    expect(declared).toMatchObject({ method, path });
  },
);

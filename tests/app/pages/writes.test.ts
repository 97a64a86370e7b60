import { TABLE_WRITES } from '@/app/(lab)/equipment/writes';
import { PASSWORD_WRITES } from '@/app/(auth)/writes';
import { WRITES } from '@/app/(lab)/jobs/writes';
import { PATH_WRITES } from '@/app/(lab)/paths/[id]/pathWrites';
import { CLOCK_WRITES } from '@/app/(lab)/products/[id]/clockWrites';
import { WRITES as PEOPLE_WRITES } from '@/app/(lab)/people/writes';
import { SETUP_WRITES } from '@/app/(lab)/sweeps/[id]/setUpWrites';
import { OPERATIONS } from '@/schemas/operations';

test.each(
  Object.entries({
    ...WRITES,
    ...PASSWORD_WRITES,
    ...PEOPLE_WRITES,
    ...TABLE_WRITES,
    ...SETUP_WRITES,
    ...CLOCK_WRITES,
    ...PATH_WRITES,
  }),
)('%s is sent as its operation declares it', (id, { method, path }) => {
  const declared = OPERATIONS.find((operation) => operation.id === id);
  expect(declared).toMatchObject({ method, path });
});

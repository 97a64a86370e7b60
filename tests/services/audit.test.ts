import fc from 'fast-check';
import { openConnection } from '@/config/database';
import { AuditEntry } from '@/models/auditEntry';
import { database } from '@/models/database';
import { unitOfWork } from '@/models/unitOfWork';
import { canonical, recordChange, verifyChain, type Change } from '@/services/audit';
import { freshDatabase, type TestDatabase } from '../support/database';

let schema: TestDatabase;
beforeAll(async () => {
  schema = await freshDatabase();
  database();
});
afterAll(() => schema.close());

const change = (scope: string, more: Partial<Change> = {}): Change => ({
  scope,
  action: 'changed',
  subjectType: 'thing',
  subjectId: '0000000000000000',
  before: { value: 1 },
  after: { value: 2 },
  ...more,
});
const record = (...changes: Change[]) => unitOfWork(async () => changes.forEach((one) => recordChange(null, one)));

test('a chain of changes verifies, and each entry follows the one before', async () => {
  for (let i = 0; i < 5; i++) await record(change('lab', { after: { i } }));
  const entries = await unitOfWork(() => AuditEntry.findAll({ where: { scope: 'lab' }, order: [['seq', 'ASC']] }));
  expect(entries.map((entry) => Number(entry.seq))).toEqual([1, 2, 3, 4, 5]);
  for (let i = 1; i < 5; i++) expect(entries[i]!.previousHash).toBe(entries[i - 1]!.hash);
  expect(await verifyChain('lab')).toBeNull();
});

test('thirty changes at once make one chain without a fork', async () => {
  await Promise.all(Array.from({ length: 30 }, (_, i) => record(change('job-race', { after: { i } }))));
  expect(await verifyChain('job-race')).toBeNull();
  expect(await unitOfWork(() => AuditEntry.count({ where: { scope: 'job-race' } }))).toBe(30);
});

test('changes of two scopes in one unit do not deadlock with the opposite order', async () => {
  const both = (first: string, second: string) => record(change(first), change(second));
  await Promise.all(Array.from({ length: 12 }, (_, i) => (i % 2 ? both('job-x', 'job-y') : both('job-y', 'job-x'))));
  expect([await verifyChain('job-x'), await verifyChain('job-y')]).toEqual([null, null]);
});

test('the application’s account can neither change nor delete an entry', async () => {
  await expect(unitOfWork(() => AuditEntry.update({ action: 'x' }, { where: { scope: 'lab' } }))).rejects.toThrow(
    /denied/,
  );
  await expect(unitOfWork(() => AuditEntry.destroy({ where: { scope: 'lab' } }))).rejects.toThrow(/denied/);
});

test.each([
  [
    'an altered entry',
    `UPDATE audit_entries SET canonical = REPLACE(canonical, '"i":2', '"i":9') WHERE scope = 'lab' AND seq = 3`,
    3,
  ],
  ['a missing entry in the middle', `DELETE FROM audit_entries WHERE scope = 'job-race' AND seq = 10`, 10],
  ['a missing end', `DELETE FROM audit_entries WHERE scope = 'job-x' AND seq = 12`, 12],
] as const)('%s is found', async (_what, sql, at) => {
  const owner = await openConnection(schema.migrateUrl);
  await owner.query(sql).finally(() => owner.end());
  expect(await verifyChain(sql.match(/scope = '([\w-]+)'/)![1]!)).toBe(at);
});

test('canonical bytes do not depend on the order of keys, and parse back to the same value', () => {
  fc.assert(
    fc.property(fc.dictionary(fc.string(), fc.jsonValue()), (value) => {
      const shuffled = Object.fromEntries(Object.entries(value).reverse());
      expect(canonical(shuffled)).toBe(canonical(value));
      // JSON has no negative zero
      expect(JSON.parse(canonical(value))).toEqual(JSON.parse(JSON.stringify(value)));
    }),
  );
});

export default async function teardown(): Promise<void> {
  await (globalThis as { stillfieldSeeded?: { drop(): Promise<void> } }).stillfieldSeeded?.drop();
}

import type { BrowserWorld } from './browserSetup';

export default async function teardown(): Promise<void> {
  const world = (globalThis as { stillfieldBrowserWorld?: BrowserWorld }).stillfieldBrowserWorld;
  if (!world) return;
  await world.server.stop();
  await world.drop();
}

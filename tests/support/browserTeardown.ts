import type { BrowserWorld } from './browserSetup';

export default async function teardown(): Promise<void> {
  const world = (globalThis as { stillfieldBrowserWorld?: BrowserWorld }).stillfieldBrowserWorld;
  if (!world) return;
  for (const { process: child } of world.beside) child.kill('SIGTERM');
  await Promise.all([world.server.stop(), ...world.beside.map(({ ended }) => ended)]);
  await world.drop();
}

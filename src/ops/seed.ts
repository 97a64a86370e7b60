/*
 * Fills an empty database with the demo lab, through the same services that people use, in one transaction: an
 * interrupted seeding leaves nothing. Days are counted from the day of seeding.
 */
import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { equipment as demoEquipment } from '@fixtures/demo/equipment';
import { dateOf, instantOf } from '@fixtures/demo/dates';
import { limitSets as demoLimitSets } from '@fixtures/demo/limitSets';
import { organisations as demoOrganisations, users as demoUsers } from '@fixtures/demo/people';
import { closeDatabase, database } from '@/models/database';
import { unitOfWork } from '@/models/unitOfWork';
import { dayIn } from '@/services/lab';
import { seedJobs, seedRuns } from './seedJobs';
import { seedEquipment, seedPaths } from './seedBench';
import { seedClocks } from './seedClocks';
import { seedBookings, seedCustody, seedPositions, seedResultMails } from './seedBookings';
import { enterPublishedLimits } from './publishedLimits';
import { seedPeople } from './seedPeople';
import { seedSetups } from './seedSetups';
import { seedRetests } from './seedRetests';

const ZONE = 'Europe/London';

async function seed(): Promise<void> {
  const seedDay = dayIn(ZONE, new Date());
  const at = (day: number, time = '08:00') => new Date(instantOf(seedDay, { day, time }));
  const started = performance.now();
  database();
  await unitOfWork(async () => {
    const people = await seedPeople(demoOrganisations, demoUsers, at(-400));
    const manager = people.actor('anselm');
    const sets = await enterPublishedLimits(manager, demoLimitSets, at(-399));
    const items = await seedEquipment(manager, demoEquipment, (day) => dateOf(seedDay, day), at);
    await seedPaths(manager, items, at);
    const seeded = await seedJobs(people, at);
    await seedClocks(people, at);
    const runs = await seedRuns(people, seeded, sets, seedDay);
    const { states } = seeded;
    await seedSetups(people, states, at);
    await seedRetests(people, states, (day) => dateOf(seedDay, day), at);
    const booked = await seedBookings(people, await seedPositions(people, at), states, at);
    await seedCustody(people, states, at);
    await seedResultMails(people, states, at);
    process.stdout.write(`  ${booked} bookings\n`);
    process.stdout.write(`  ${items.size} items of equipment, ${sets.size} limit sets, ${runs} runs\n`);
  });
  const state = process.env.STILLFIELD_STATE ?? '.stillfield';
  const lines = demoUsers.map((user) => {
    const organisation = demoOrganisations.find(({ key }) => key === user.organisation)!;
    return `${user.email.padEnd(34)} ${user.passphrase.padEnd(44)} ${user.role}, ${organisation.name}`;
  });
  writeFileSync(path.join(state, 'demo-sign-ins.txt'), `${lines.join('\n')}\n`, { mode: 0o600 });
  process.stdout.write(`  filled in ${((performance.now() - started) / 1000).toFixed(1)} s\n`);
}

seed()
  .finally(() => closeDatabase())
  .catch((error: unknown) => {
    process.stderr.write(`The demo lab could not be filled: ${error instanceof Error ? error.stack : String(error)}\n`);
    process.exitCode = 1;
  });

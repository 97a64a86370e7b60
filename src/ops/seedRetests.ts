import { retestActs } from '@fixtures/demo/retests';
import { changeRetest, listRetests } from '@/services/retests';
import type { SeededPeople } from './seedPeople';

/** What people of the story did with single retests, once the runs have opened them. */
export async function seedRetests(
  people: SeededPeople,
  states: ReadonlyMap<string, string>,
  dayOf: (day: number) => string,
  at: (day: number, time?: string) => Date,
): Promise<void> {
  for (const { state, frequencyMhz, by, day, time, act } of retestActs) {
    const actor = people.actor(by);
    const { items } = await listRetests(actor, { limit: 200, stateId: states.get(state)!, status: 'open' });
    const item = items.find(({ frequencyHz }) => Math.abs(frequencyHz! / 1e6 - frequencyMhz) < 0.0005);
    if (!item) throw new RangeError(`${state} has no open retest at ${frequencyMhz} MHz`);
    const body = act.act === 'schedule' ? { ...act, day: dayOf(act.day) } : act;
    await changeRetest(actor, item.id, item.version, body, at(day, time));
  }
}

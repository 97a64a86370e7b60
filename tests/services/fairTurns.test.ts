import { FairTurns } from '@/services/fairTurns';

/** Takes turns until nobody may have one, and says whose they were. */
function takeAll(turns: FairTurns<string>): string[] {
  const taken: string[] = [];
  for (let turn = turns.next(); turn !== null; turn = turns.next()) {
    taken.push(turn.item);
    turns.done(turn.person);
  }
  return taken;
}

test('people take turns, however much each of them asks for', () => {
  const turns = new FairTurns<string>(2);
  for (const item of ['a1', 'a2', 'a3', 'a4']) turns.add(1, item);
  turns.add(2, 'b1');
  turns.add(3, 'c1');
  turns.add(2, 'b2');
  expect(takeAll(turns)).toEqual(['a1', 'b1', 'c1', 'a2', 'b2', 'a3', 'a4']);
  expect(turns.waiting).toBe(0);
});

test('one person has at most so many under way; what another sends comes before the rest of the first', () => {
  const turns = new FairTurns<string>(2);
  for (const item of ['a1', 'a2', 'a3']) turns.add(1, item);
  expect([turns.next()?.item, turns.next()?.item, turns.next()]).toEqual(['a1', 'a2', null]);
  turns.add(2, 'b1');
  expect(turns.next()?.item).toBe('b1');
  expect(turns.next()).toBeNull();
  expect([turns.waitingOf(1), turns.waitingOf(2)]).toEqual([1, 0]);
  turns.done(1);
  expect(turns.next()?.item).toBe('a3');
});

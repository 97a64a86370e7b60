/**
 * Whose turn it is when several people want more than there is: people take turns, however much each of them asks for,
 * and one person never has more than `mostPerPerson` under way, so that what somebody else sends finds a place.
 */
export class FairTurns<T> {
  private readonly queues = new Map<number, T[]>();
  private readonly underWay = new Map<number, number>();

  constructor(private readonly mostPerPerson: number) {}

  get waiting(): number {
    let count = 0;
    for (const queue of this.queues.values()) count += queue.length;
    return count;
  }

  waitingOf(person: number): number {
    return this.queues.get(person)?.length ?? 0;
  }

  add(person: number, item: T): void {
    const queue = this.queues.get(person);
    if (queue) queue.push(item);
    else this.queues.set(person, [item]);
  }

  /** The next item, of the person who has waited longest for a turn; null when nobody may have one. `done` ends it. */
  next(): { person: number; item: T } | null {
    for (const [person, queue] of this.queues) {
      const running = this.underWay.get(person) ?? 0;
      if (running >= this.mostPerPerson) continue;
      const item = queue.shift()!;
      // Back to the end of the line, behind everybody who waits.
      this.queues.delete(person);
      if (queue.length > 0) this.queues.set(person, queue);
      this.underWay.set(person, running + 1);
      return { person, item };
    }
    return null;
  }

  done(person: number): void {
    const running = (this.underWay.get(person) ?? 0) - 1;
    if (running > 0) this.underWay.set(person, running);
    else this.underWay.delete(person);
  }
}

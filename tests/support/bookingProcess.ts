/* A process with a pool of its own that books what it is told, all at once, and tells what came of each. */

import type { Actor } from '@/auth/actor';
import { closeDatabase, database } from '@/models/database';
import { unitOfWork } from '@/models/unitOfWork';
import type { BookingView } from '@/schemas/booking';
import { createBooking } from '@/services/bookings';
import { labSettings } from '@/services/lab';

export interface Told {
  actor: Actor;
  bodies: Parameters<typeof createBooking>[1][];
}
export interface Outcome {
  won: BookingView | null;
  /** `conflict` for a clash; anything else is a fault. */
  kind: string | null;
  message: string;
}

async function book({ actor, bodies }: Told): Promise<Outcome[]> {
  return Promise.all(
    bodies.map(async (body): Promise<Outcome> => {
      try {
        return { won: await createBooking(actor, body), kind: null, message: '' };
      } catch (error) {
        const { kind, message, name } = error as Error & { kind?: string };
        return { won: null, kind: kind ?? name, message };
      }
    }),
  );
}

process.on('message', (told: Told | 'end') => {
  if (told === 'end') {
    void closeDatabase().then(() => process.disconnect());
    return;
  }
  void book(told).then((outcomes) => process.send!(outcomes));
});

database();
// Connections are opened before the race, so that they start together.
void Promise.all(Array.from({ length: 10 }, () => unitOfWork(() => labSettings()))).then(() => process.send!('ready'));

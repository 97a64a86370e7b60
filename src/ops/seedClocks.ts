import { clocks as demoClocks } from '@fixtures/demo/clocks';
import { Product } from '@/models/product';
import { addProductClock } from '@/services/clocks';
import type { SeededPeople } from './seedPeople';

/** Declares what the demo products run at. Answers how many. */
export async function seedClocks(people: SeededPeople, at: (day: number) => Date): Promise<number> {
  for (const { product: code, by, day, ...clock } of demoClocks) {
    const product = await Product.findOne({ where: { code }, rejectOnEmpty: true });
    await addProductClock(people.actor(by), product.publicId, { ...clock, spread: null }, at(day));
  }
  return demoClocks.length;
}

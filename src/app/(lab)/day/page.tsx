import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { asked, type Search } from '@/app/(lab)/jobs/listed';
import { mayRole } from '@/auth/permissions';
import { day as isoDay } from '@/schemas/common';
import { bookingChoices, readDay } from '@/services/day';
import { DaySheet } from './DaySheet';

export const metadata: Metadata = { title: 'Day' };

/** The lab's day: who measures what at which position. `?day=2026-12-01` for another one. */
export default async function DayPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const day = await asked(searchParams, 'day');
  if (day !== undefined && !isoDay.safeParse(day).success) notFound();
  const view = await found(readDay(actor, day ?? null));
  const books = mayRole(actor.role, 'booking.write');
  const choices = books ? await bookingChoices(actor) : null;
  return <DaySheet key={view.day} view={view} choices={choices} upload={mayRole(actor.role, 'sweep.keep')} />;
}

import type { Actor } from '@/auth/actor';
import { dayOf } from '@/format/dates';
import type { SampleView } from '@/schemas/job';
import { sampleFinding } from './sampleFinding';
import { firstOf, latestStandings, runsOf, standingReader, type Standing } from './standing';
import { stateGrid } from './stateGrid';

/** All that the sheets of a sample and of its product show of its runs. */
export async function sampleRecord(actor: Actor, sample: SampleView, zone: string) {
  const { runs, more } = sample.states.some((state) => state.runs > 0)
    ? await runsOf(actor, sample.id)
    : { runs: [], more: false };
  const read = standingReader(actor);
  const grid = await stateGrid(actor, sample, runs, read);
  const latest = await latestStandings(read, runs);
  const stands = [];
  for (const standing of latest) stands.push({ ...standing, first: await firstOf(read, runs, standing) });
  const shown = grid.rows.flatMap(({ cells }) => cells.flatMap(({ standing }) => standing ?? []));
  return { runs, more, grid, latest, finding: sampleFinding(stands), days: measuredDays([...latest, ...shown], zone) };
}

/** The newest day on which a state was measured, or kept when the file did not say, by its label. */
function measuredDays(standings: readonly Standing[], zone: string): Map<string, string> {
  const days = new Map<string, string>();
  for (const { state, sweep } of standings) {
    const day = dayOf(sweep.measuredAt ?? sweep.keptAt, zone);
    if (day > (days.get(state) ?? '')) days.set(state, day);
  }
  return days;
}

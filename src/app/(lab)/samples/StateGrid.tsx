import Link from 'next/link';
import { SmallMultiple } from '@/components/charts/SmallMultiple';
import { wholeSpan } from '@/components/charts/scale';
import { StateTag } from '@/components/ui/StateTag';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatShortDay } from '@/format/dates';
import { formatFrequencyRange } from '@/format/frequencies';
import { formatDistance } from '@/format/quantities';
import { capitalised, PORT_METHODS, PORT_WORDS, VERDICT_WORDS } from '@/format/words';
import { GridKeys } from './GridKeys';
import type { Grid, GridCell, GridRow } from './stateGrid';
import type { Standing } from './standing';

const CELL = 'w-[190px] flex-none max-pad:w-[104px]';
const CELLS = 'flex gap-x-[19px] max-pad:gap-x-[23px]';

/** Ports down, modification states across: the worst run of each, hanging from its own line. */
export function StateGrid({ grid, days }: { grid: Grid; days: ReadonlyMap<string, string> }) {
  return (
    <div
      className="-mx-1 overflow-x-auto overflow-y-hidden px-1 pt-1 pb-1"
      role="region"
      aria-label="Worst margin by port and state"
      tabIndex={0}
      data-state-grid
    >
      <GridKeys />
      <div className="w-max pad:grid pad:grid-cols-[9.5rem_auto] pad:gap-x-[19px]">
        <p className="t-detail max-pad:hidden">
          Worst margin, dB,
          <br />
          by port
        </p>
        <ol className={`${CELLS} items-end`}>
          {grid.states.map((state) => (
            <li key={state.id} className={`${CELL} flex items-center gap-2 border-b-[1.5px] border-ink pb-1.5`}>
              <StateTag label={state.label} planned={state.planned} />
              <span
                className="min-w-0 flex-1 truncate text-[13px] leading-5 font-semibold max-pad:hidden"
                title={state.description}
              >
                {state.description}
              </span>
              <span className="ml-auto flex-none text-[13px] leading-5 whitespace-nowrap text-ink2 max-pad:text-[12px]">
                {state.planned ? 'planned' : days.has(state.label) ? formatShortDay(days.get(state.label)!) : ''}
              </span>
            </li>
          ))}
        </ol>
        {grid.rows.map((row) => (
          <PortRow key={row.port} row={row} />
        ))}
      </div>
    </div>
  );
}

function PortRow({ row }: { row: GridRow }) {
  const { port, cells, latest } = row;
  return (
    <>
      <div className="pt-4 max-pad:sticky max-pad:left-0 max-pad:flex max-pad:w-[calc(100vw-2rem)] max-pad:items-baseline max-pad:justify-between max-pad:pb-1">
        <h2 className="text-[14px] leading-5 font-semibold">{capitalised(PORT_WORDS[port])}</h2>
        <p className="t-detail">{methodOf(latest)}</p>
        <p className="t-figure text-[12.5px] leading-4 text-ink2 max-pad:hidden">{rangeOf(cells, latest)}</p>
      </div>
      <ol className={`${CELLS} pt-4 max-pad:pt-3`}>
        {cells.map((cell) => (
          <li key={cell.state.id} className={CELL}>
            <Cell cell={cell} name={`${cell.state.label}, ${PORT_WORDS[port]}`} />
          </li>
        ))}
      </ol>
    </>
  );
}

function Cell({ cell, name }: { cell: GridCell; name: string }) {
  const { standing, window, needs } = cell;
  const chart = (
    <SmallMultiple
      name={name}
      window={window}
      traceIndex={standing?.worst?.traceIndex}
      worst={standing?.worst ?? null}
      needs={needs}
    />
  );
  if (!standing) return chart;
  const { sweep, verdict } = standing;
  return (
    <Link
      prefetch={false}
      href={`/sweeps/${sweep.id}`}
      className="block text-ink hover:no-underline"
      data-cell
      title={sweep.number}
    >
      {chart}
      {sweep.partial && <p className="t-detail pt-0.5">partial run</p>}
      {verdict !== sweep.evaluation.worst?.verdict && (
        <VerdictWord verdict={verdict} className="t-small pt-0.5">
          port {VERDICT_WORDS[verdict]}
        </VerdictWord>
      )}
    </Link>
  );
}

/** `radiated at 3 m`, `conducted, AMN-1`. */
function methodOf({ sweep }: Standing): string {
  const method = PORT_METHODS[sweep.port];
  if (sweep.port === 'enclosure')
    return sweep.distanceM === null ? method : `${method} at ${formatDistance(sweep.distanceM)}`;
  const coupler = sweep.path?.items.find(({ role }) => ['amn', 'aan', 'current-probe', 'voltage-probe'].includes(role));
  return coupler ? `${method}, ${coupler.identifier}` : method;
}

function rangeOf(cells: readonly GridCell[], latest: Standing): string {
  const { fromHz, toHz } = cells.find(({ window }) => window)?.window ?? {
    fromHz: latest.sweep.firstHz,
    toHz: latest.sweep.lastHz,
  };
  const span = wholeSpan(fromHz, toHz);
  return formatFrequencyRange(span.fromHz, span.toHz);
}

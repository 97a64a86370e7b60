'use client';

import { createContext, useContext, useEffect, useMemo, useRef } from 'react';
import { AgGridProvider, AgGridReact, type CustomCellRendererProps } from 'ag-grid-react';
import type { CellFocusedEvent, CellKeyDownEvent, ColDef, GridApi } from 'ag-grid-community';
import { useBoxSize } from '@/components/charts/useBoxSize';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatFrequencyKhz, formatFrequencyMhz } from '@/format/frequencies';
import { formatAzimuth, formatDb, formatHeight } from '@/format/quantities';
import { DETECTOR_MARKS, POLARISATION_MARKS } from '@/format/words';
import type { CandidateView } from '@/schemas/sweep';
import { candidateRemark, shownColumns, type CandidateFigures, type CandidateFrame } from './candidateColumns';
import { GridHead, type GridHeadParams } from './GridHead';
import { GRID_BOX, GRID_MODULES, gridOptions } from './gridLook';
import { LevelFigure, MarginFigure } from './MarginFigure';

interface Props extends CandidateFigures {
  candidates: readonly CandidateView[];
  frame: CandidateFrame;
  selectedRank: number | null;
  onSelect: (candidate: CandidateView) => void;
  clockHz: number | null;
}

type Column = ColDef<CandidateView>;
type CellProps = CustomCellRendererProps<CandidateView>;

/** Cells read what is open from here, so that opening a figure redraws two buttons and no rows. */
const Figures = createContext<CandidateFigures & { levelUnit: string }>({
  open: null,
  onFigure: () => {},
  levelUnit: '',
});

function LevelCell({ data }: CellProps) {
  const { levelUnit, ...figures } = useContext(Figures);
  return data ? <LevelFigure candidate={data} unit={levelUnit} {...figures} /> : null;
}

function MarginCell({ data }: CellProps) {
  const { open, onFigure } = useContext(Figures);
  return data ? <MarginFigure candidate={data} open={open} onFigure={onFigure} /> : null;
}

function VerdictCell({ data }: CellProps) {
  return data ? <VerdictWord verdict={data.verdict} /> : null;
}

function RemarkCell({ value }: CellProps) {
  return <span title={value ?? undefined}>{value}</span>;
}

/** The button shows the focus; its outline reaches over the cell's edge. */
const BUTTON_CELL = 'overflow-visible [&_.ag-cell-value]:overflow-visible [&.ag-cell-focus]:border-transparent!';

const figure = (head: GridHeadParams = {}): Partial<Column> => ({
  cellClass: 't-figure text-right',
  headerComponentParams: { ...head, figure: true },
});

function columnsOf(frame: CandidateFrame, widthPx: number, clockHz: number | null): Column[] {
  const shown = shownColumns(widthPx, frame);
  const frequency = frame.frequencyUnit === 'kHz' ? formatFrequencyKhz : formatFrequencyMhz;
  const columns: (Column | false)[] = [
    {
      colId: 'rank',
      headerName: 'No.',
      width: 24,
      minWidth: 24,
      ...figure(),
      cellClass: 't-figure text-right text-ink3',
      valueGetter: ({ data }) => data?.rank,
      headerComponentParams: { hidden: true },
    },
    {
      colId: 'frequency',
      headerName: 'Frequency',
      width: 96,
      ...figure({ unit: frame.frequencyUnit }),
      valueGetter: ({ data }) => data && frequency(data.frequencyHz),
    },
    {
      colId: 'detector',
      headerName: 'Detector',
      width: 76,
      cellClass: 'pl-3.5',
      valueGetter: ({ data }) => data && DETECTOR_MARKS[data.detector],
    },
    shown.reading && {
      colId: 'reading',
      headerName: 'Reading',
      width: 80,
      ...figure({ unit: frame.readingUnit }),
      valueGetter: ({ data }) => data && formatDb(data.reading),
    },
    {
      colId: 'level',
      headerName: 'Level',
      width: 90,
      ...figure({ unit: frame.levelUnit }),
      cellClass: `t-figure text-right ${BUTTON_CELL}`,
      cellRenderer: LevelCell,
    },
    {
      colId: 'limit',
      headerName: 'Limit',
      width: 54,
      ...figure(),
      cellClass: 't-figure text-right text-ink2',
      valueGetter: ({ data }) => data && formatDb(data.limit),
    },
    {
      colId: 'margin',
      headerName: 'Margin',
      width: 98,
      headerComponentParams: { unit: 'dB', figure: true },
      cellClass: `text-right ${BUTTON_CELL}`,
      cellRenderer: MarginCell,
    },
    { colId: 'verdict', headerName: 'Verdict', width: 136, cellClass: 'pl-5', cellRenderer: VerdictCell },
    shown.orientation && {
      colId: 'orientation',
      headerName: frame.line ? 'Line' : 'Pol.',
      width: 44,
      valueGetter: () => frame.line ?? (frame.polarisation && POLARISATION_MARKS[frame.polarisation]),
    },
    shown.height && {
      colId: 'height',
      headerName: 'Height',
      width: 58,
      ...figure({ unit: 'm' }),
      valueGetter: () => frame.heightM !== null && formatHeight(frame.heightM),
    },
    shown.azimuth && {
      colId: 'azimuth',
      headerName: 'Azimuth',
      width: 72,
      ...figure({ unit: '°' }),
      valueGetter: () => frame.azimuthDeg !== null && formatAzimuth(frame.azimuthDeg),
    },
    {
      colId: 'remark',
      headerName: 'Remark',
      flex: 1,
      minWidth: 60,
      cellClass: 'pl-6 truncate',
      cellRenderer: RemarkCell,
      valueGetter: ({ data }) => data && candidateRemark(data, clockHz, frame.stepHz),
    },
  ];
  return columns.filter((column) => column !== false);
}

/** The candidates in AG Grid. Arrow keys move, a moved focus selects, Enter or W opens the working. */
export default function CandidateTable({ candidates, frame, selectedRank, onSelect, open, onFigure, clockHz }: Props) {
  const box = useRef<HTMLDivElement>(null);
  const api = useRef<GridApi<CandidateView>>(null);
  const { width } = useBoxSize(box, { width: 990, height: 0 });
  const shared = useMemo(() => gridOptions<CandidateView>(), []);
  // Only the thresholds matter: a drag of the window's edge must not rebuild the columns at every pixel.
  const bucket = [700, 760, 900].filter((least) => width >= least).at(-1) ?? 0;
  const columns = useMemo(() => columnsOf(frame, bucket, clockHz), [frame, bucket, clockHz]);
  const rows = useMemo(() => [...candidates], [candidates]);
  const figures = useMemo(() => ({ open, onFigure, levelUnit: frame.levelUnit }), [open, onFigure, frame.levelUnit]);

  const follow = () => {
    const node = selectedRank === null ? null : api.current?.getRowNode(String(selectedRank));
    if (node && !node.isSelected()) node.setSelected(true, true, 'api');
  };
  useEffect(follow);

  const onCellFocused = ({ rowIndex, column }: CellFocusedEvent<CandidateView>) => {
    if (rowIndex === null || !column || typeof column === 'string') return;
    const candidate = candidates[rowIndex];
    if (candidate && candidate.rank !== selectedRank) onSelect(candidate);
    const cell = box.current?.querySelector(`[row-index="${rowIndex}"] [col-id="${column.getColId()}"]`);
    cell?.querySelector('button')?.focus({ preventScroll: true });
  };

  const onCellKeyDown = (event: CellKeyDownEvent<CandidateView>) => {
    const key = event.event;
    if (!(key instanceof KeyboardEvent) || key.ctrlKey || key.metaKey || key.altKey || !event.data) return;
    const onButton = key.target instanceof HTMLButtonElement;
    if (key.key.toLowerCase() !== 'w' && (key.key !== 'Enter' || onButton)) return;
    key.preventDefault();
    onFigure(event.data, event.column.getColId() === 'level' ? 'level' : 'margin');
  };

  return (
    <div ref={box} className={GRID_BOX}>
      <Figures.Provider value={figures}>
        <AgGridProvider modules={GRID_MODULES}>
          <AgGridReact<CandidateView>
            {...shared}
            components={COMPONENTS}
            columnDefs={columns}
            rowData={rows}
            getRowId={({ data }) => String(data.rank)}
            onGridReady={(ready) => {
              api.current = ready.api;
              box.current
                ?.querySelector('[role="grid"], [role="treegrid"]')
                ?.setAttribute('aria-label', 'Candidates, worst first');
              follow();
            }}
            onRowDataUpdated={follow}
            onCellFocused={onCellFocused}
            onCellKeyDown={onCellKeyDown}
            focusGridInnerElement={(focused) => {
              const index = candidates.findIndex(({ rank }) => rank === selectedRank);
              if (candidates.length === 0) return false;
              focused.api.setFocusedCell(Math.max(0, index), 'margin');
              return true;
            }}
          />
        </AgGridProvider>
      </Figures.Provider>
    </div>
  );
}

const COMPONENTS = { agColumnHeader: GridHead };

'use client';

import {
  CellStyleModule,
  ClientSideRowModelModule,
  createTheme,
  RowApiModule,
  RowSelectionModule,
  RowStyleModule,
  type ColDef,
  type GridOptions,
  type Module,
} from 'ag-grid-community';

/** Only what the grids use; the rest of the library stays out of the bundle. */
export const GRID_MODULES: Module[] = [
  ClientSideRowModelModule,
  CellStyleModule,
  RowSelectionModule,
  RowStyleModule,
  RowApiModule,
];

/** The look of every table here: head over 1.5 px ink, rows parted by a rule, no zebra and no vertical lines. */
export const gridTheme = createTheme().withParams({
  accentColor: 'var(--pen)',
  autoHeightMinBodyHeight: 0,
  backgroundColor: 'transparent',
  borderColor: 'var(--rule)',
  borderRadius: 0,
  browserColorScheme: 'inherit',
  cellHorizontalPadding: 0,
  cellTextColor: 'var(--ink)',
  columnBorder: false,
  fontFamily: 'inherit',
  fontSize: 'var(--size-table)',
  foregroundColor: 'var(--ink)',
  headerBackgroundColor: 'transparent',
  headerColumnBorder: false,
  headerHeight: '1.875rem',
  headerRowBorder: { style: 'solid', width: '1.5px', color: 'var(--ink)' },
  headerTextColor: 'var(--ink3)',
  oddRowBackgroundColor: 'transparent',
  rowBorder: { style: 'solid', width: 1, color: 'var(--rule)' },
  rowHeight: 'var(--row)',
  rowHoverColor: 'transparent',
  selectedRowBackgroundColor: 'var(--penw)',
  spacing: 6,
  wrapperBackgroundColor: 'transparent',
  wrapperBorder: false,
  wrapperBorderRadius: 0,
});

/** Round a grid: the last rule; in forced colours no cell borders, and a line around the selected row. */
export const GRID_BOX = [
  'border-b border-rule',
  'forced-colors:[&_.ag-cell]:border-0',
  'forced-colors:[&_.ag-row-selected]:outline-2',
].join(' ');

export const GRID_COLUMN: ColDef = {
  sortable: false,
  resizable: false,
  suppressMovable: true,
  suppressHeaderMenuButton: true,
  // A cell's own button takes Enter and Space.
  suppressKeyboardEvent: ({ event }) => event.key === 'Enter' || event.key === ' ',
};

/** After a soft navigation the response's nonce is another than the document's: the document's is the one that counts. */
const documentNonce = () => document.querySelector<HTMLScriptElement>('script[nonce]')?.nonce;

/** Options every grid shares. Grids are drawn in the browser only. */
export function gridOptions<Row>(): GridOptions<Row> {
  return {
    theme: gridTheme,
    styleNonce: documentNonce(),
    // In the layer of the other controls, so that utilities win over the grid's own rules.
    themeCssLayer: 'components',
    themeStyleContainer: document.body,
    defaultColDef: GRID_COLUMN as ColDef<Row>,
    domLayout: 'autoHeight',
    animateRows: false,
    ensureDomOrder: true,
    suppressColumnVirtualisation: true,
    suppressHeaderFocus: true,
    suppressRowHoverHighlight: true,
    suppressOverlays: ['noRows', 'loading'],
    enableCellTextSelection: true,
    rowSelection: { mode: 'singleRow', checkboxes: false, enableClickSelection: 'enableSelection' },
    // Tab leaves the table; the arrow keys move in it.
    tabToNextCell: () => false,
  };
}

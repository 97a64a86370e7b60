import type { RecognitionView } from '@/schemas/sweepFile';
import { unitLabel } from '@/format/quantities';
import { DETECTOR_WORDS } from '@/format/words';

type Column = RecognitionView['columns'][number];

/** How a column was read: `frequency, MHz`, `level, dBµV, peak`. */
function roleWords(recognition: RecognitionView, column: Column): string {
  if (column.role === 'frequency') return `frequency, ${recognition.frequency.unit ?? 'unit not stated'}`;
  if (column.role !== 'level') return column.role === 'blank' ? 'unused' : column.role;
  const trace = recognition.traces.find(({ column: at }) => at === column.index);
  const parts = ['level', trace?.unit ? unitLabel(trace.unit) : 'unit not stated'];
  if (trace?.detector) parts.push(DETECTOR_WORDS[trace.detector]);
  return parts.join(', ');
}

/** The file's first lines, its first and last rows; brackets say how each column was read. */
export function FilePreview({ recognition, wrongLine }: { recognition: RecognitionView; wrongLine?: number | null }) {
  const { preview, columns, refusal } = recognition;
  return (
    <div
      className="preview overflow-x-auto border border-rule2 bg-margin py-2"
      tabIndex={0}
      role="region"
      aria-label="Lines of the file"
    >
      <table className="t-figure text-[0.8125rem] leading-[21px]">
        <thead>
          <tr className="text-left align-bottom text-pen italic">
            <th className="px-3 font-normal">
              <span className="sr-only">line</span>
            </th>
            {columns.slice(0, 8).map((column) => (
              <th key={column.index} className="px-2 pb-1 font-normal whitespace-nowrap" scope="col">
                <span className="block border-t border-x border-pen px-1 pt-0.5 font-sans tracking-normal [word-spacing:normal]">
                  {roleWords(recognition, column)}
                </span>
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {preview.map((row) => {
            const wrong = row.line === (wrongLine ?? -1);
            return (
              <tr key={row.line} className={wrong ? 'bg-madderw' : ''}>
                <td className={`px-3 text-right ${wrong ? 'font-semibold text-madder' : 'text-ink3'}`}>{row.line}</td>
                {row.cells && row.role !== 'preamble' ? (
                  <>
                    {row.cells.slice(0, 8).map((cell, i) => (
                      <td key={i} className="px-2 whitespace-pre">
                        <span className={row.role === 'row' && !wrong ? 'bg-sheet px-1' : 'px-1 text-ink2'}>
                          {cell}
                        </span>
                      </td>
                    ))}
                    {wrong && refusal ? (
                      <td className="px-2">
                        <span className="border border-dashed border-madder px-2 font-sans text-madder">
                          {refusal.expected}
                        </span>
                      </td>
                    ) : null}
                  </>
                ) : (
                  <td
                    className="max-w-[420px] truncate px-3 whitespace-pre text-ink2"
                    colSpan={Math.max(1, Math.min(8, columns.length))}
                  >
                    {row.text}
                    {wrong && refusal ? (
                      <span className="ml-2 border border-dashed border-madder px-2 font-sans text-madder">
                        {refusal.expected}
                      </span>
                    ) : null}
                  </td>
                )}
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

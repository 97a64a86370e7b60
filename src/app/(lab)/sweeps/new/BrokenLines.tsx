import { formatCount } from '@/format/quantities';
import type { RecognitionView } from '@/schemas/sweepFile';

/** The broken line on a wash with its neighbours; a dashed box stands where the missing part belongs. */
export function BrokenLines({
  broken,
  wrongLine,
}: {
  broken: NonNullable<RecognitionView['broken']>;
  wrongLine: number;
}) {
  return (
    <div
      className="overflow-x-auto border border-rule2 bg-margin py-1.5"
      tabIndex={0}
      role="region"
      aria-label={`Lines around line ${wrongLine}`}
    >
      <table className="t-figure w-full text-[0.8125rem] leading-[27px]">
        <tbody>
          {broken.lines.map(({ line, text }) => {
            const wrong = line === wrongLine;
            return (
              <tr key={line} className={wrong ? 'border-t border-madder bg-madderw' : ''}>
                <th
                  scope="row"
                  className={`w-px pr-6 pl-5 text-right font-normal ${wrong ? 'font-semibold text-madder' : 'text-ink3'}`}
                >
                  {formatCount(line)}
                </th>
                <td className="pr-4 whitespace-pre">
                  {text === null ? <span className="text-ink3">–</span> : wrong ? null : text}
                  {wrong && text !== null && (
                    <>
                      {text.slice(0, broken.after)}
                      <span className="border border-dashed border-madder px-2 font-sans text-[0.8125rem] font-semibold tracking-normal text-madder [word-spacing:normal]">
                        {broken.missing}
                      </span>
                      {text.slice(broken.after)}
                    </>
                  )}
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

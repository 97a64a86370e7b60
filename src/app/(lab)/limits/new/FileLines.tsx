interface Line {
  line: number;
  text: string;
}

/** The file's first lines as they stand; the one at fault is marked. */
export function FileLines({
  lines,
  more,
  wrongLine,
}: {
  lines: readonly Line[];
  more: readonly Line[];
  wrongLine: number | null;
}) {
  const shown = more.length > 0 ? more : lines;
  return (
    <div
      className="preview mt-5 max-h-[320px] overflow-auto border border-rule2 bg-margin py-2"
      tabIndex={0}
      role="region"
      aria-label="Lines of the file"
    >
      <table className="t-figure text-[0.8125rem] leading-[21px]">
        <tbody>
          {shown.map(({ line, text }) => (
            <tr key={line} className={line === wrongLine ? 'bg-madderw' : ''}>
              <td className={`px-3 text-right ${line === wrongLine ? 'font-semibold text-madder' : 'text-ink3'}`}>
                {line}
              </td>
              <td className="px-2 whitespace-pre">{text}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

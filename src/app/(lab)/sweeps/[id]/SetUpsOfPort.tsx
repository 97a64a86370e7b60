import { setupsText } from '@/format/setup';
import type { SweepView } from '@/schemas/sweep';

/** What the runs that speak for a port leave unsaid of their set-ups; no verdict hangs on it. */
export function SetUpsOfPort({ runs, className }: { runs: SweepView['portVerdict']['runs']; className?: string }) {
  return (
    <ul className={className}>
      {setupsText(runs).map(({ text, remark }) => (
        <li key={text} className={remark ? 'text-ochre' : 'column-quiet'}>
          {text}
        </li>
      ))}
    </ul>
  );
}

import { LeaveGuard as Guard } from '@/components/forms/LeaveGuard';
import { files, type DropEntry } from './dropEntry';

/** Asks before the sheet is left with files that are not kept. */
export function LeaveGuard({ entries }: { entries: readonly DropEntry[] }) {
  const unkept = entries.length;
  const sending = entries.filter(({ file }) => !file).length;
  return (
    <Guard when={unkept > 0} title={`Leave with ${files(unkept)} not kept?`} act={`Leave ${files(unkept)}`}>
      {sending > 0
        ? `${files(sending)} ${sending === 1 ? 'is' : 'are'} still being sent and would have to be dropped again. `
        : ''}
      What is recognised is held for a day; the back button brings it back.
    </Guard>
  );
}

import { Button } from '@/components/ui/Button';
import { SelectField } from '@/components/ui/Field';
import { runLabel } from './runLabel';
import type { ListedRun } from './runLabel';

interface Props {
  /** Of one sample, newest first; voided ones are said to be. */
  runs: readonly ListedRun[];
  /** The run that is laid over another; without it both are chosen. */
  over?: { id: string; number: string };
  /** The two that are shown now. */
  chosen?: { a?: string; b?: string };
}

/** Chooses two runs of a sample to be laid over each other; a plain form, which needs no script. */
export function LayOver({ runs, over, chosen }: Props) {
  const others = over ? runs.filter(({ id }) => id !== over.id) : runs;
  if (others.length < (over ? 1 : 2)) {
    return <p className="t-detail mt-2">There is no second run of this sample yet.</p>;
  }
  const options = others.map((run) => (
    <option key={run.id} value={run.id}>
      {runLabel(run)}
    </option>
  ));
  return (
    <form
      action="/compare"
      method="get"
      aria-label="Two runs over each other"
      className="mt-2 flex flex-wrap items-end gap-x-4 gap-y-2 print:hidden"
    >
      {over ? (
        <input type="hidden" name="b" value={over.id} />
      ) : (
        <SelectField
          label="Lay"
          name="b"
          defaultValue={chosen?.b ?? others[0]!.id}
          className="w-full min-w-0 pad:w-[24rem]"
        >
          {options}
        </SelectField>
      )}
      <SelectField
        label={over ? `Lay ${over.number} over` : 'over'}
        name="a"
        defaultValue={chosen?.a ?? others.find(({ id }) => id !== others[0]!.id || over)?.id}
        className="w-full min-w-0 pad:w-[24rem]"
        keyName={over && 'O'}
      >
        {options}
      </SelectField>
      <Button type="submit">Lay over each other</Button>
    </form>
  );
}

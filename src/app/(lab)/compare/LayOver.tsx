import { Button } from '@/components/ui/Button';
import { SelectField } from '@/components/ui/Field';
import { likest, runLabel, sameReading, type ListedRun } from './runLabel';

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
  const first = runs.find(({ id }) => id === (over?.id ?? chosen?.b)) ?? others[0]!;
  const second = others.find(({ id }) => id === chosen?.a) ?? likest(first, others);
  const option = (run: ListedRun) => (
    <option key={run.id} value={run.id}>
      {runLabel(run)}
    </option>
  );
  const alike = others.filter((run) => sameReading(run, first));
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
        <SelectField label="Lay" name="b" defaultValue={first.id} className="w-full min-w-0 pad:w-[24rem]">
          {others.map(option)}
        </SelectField>
      )}
      <SelectField
        label={over ? `Lay ${over.number} over` : 'over'}
        name="a"
        defaultValue={second.id}
        className="w-full min-w-0 pad:w-[24rem]"
        keyName={over && 'O'}
      >
        {over && alike.length > 0 ? (
          <>
            <optgroup label="The same port and position">{alike.map(option)}</optgroup>
            <optgroup label="Others">{others.filter((run) => !alike.includes(run)).map(option)}</optgroup>
          </>
        ) : (
          others.map(option)
        )}
      </SelectField>
      <Button type="submit">Lay over each other</Button>
    </form>
  );
}

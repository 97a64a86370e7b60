import { StateTag } from '@/components/ui/StateTag';
import { formatDay } from '@/format/dates';
import type { SampleView } from '@/schemas/job';

/** What each modification state is, in the margin: the heads of the charts have no room for it. */
export function statesSection(sample: SampleView | undefined, days: ReadonlyMap<string, string>) {
  if (!sample) return [];
  return [
    {
      id: 'states',
      title: 'States',
      subject: `of ${sample.code}`,
      children: (
        <ol>
          {sample.states.map((state) => {
            const day = days.get(state.label);
            return (
              <li key={state.id}>
                <StateTag label={state.label} planned={state.planned} className="mr-2" />
                {state.description}
                <span className="column-quiet block">
                  {state.planned ? 'planned' : day ? `measured ${formatDay(day)}` : 'not measured'}
                </span>
              </li>
            );
          })}
        </ol>
      ),
    },
  ];
}

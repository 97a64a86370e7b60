import type { MarginSection } from '@/components/shell/marginSection';
import { setupSummary } from '@/format/setup';
import { SetUp, type SetUpProps } from './SetUp';

/** How the run was set up, for its column. */
export function setUpSection(props: SetUpProps): MarginSection {
  const { brief } = props.setup;
  const summary = setupSummary(brief);
  return {
    id: 'set-up',
    title: 'Set-up',
    summary: brief.eutStayed === 'no' ? <span className="text-ochre">{summary}</span> : summary,
    ...(props.photos.items.length > 0 && { count: props.photos.items.length }),
    children: <SetUp {...props} />,
  };
}

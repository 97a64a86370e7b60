import type { MarginSection } from '@/components/shell/marginSection';
import { setupSummary } from '@/format/setup';
import type { PhotoView, SetupView } from '@/schemas/setup';
import type { SweepView } from '@/schemas/sweep';
import { SetUp } from './SetUp';

export interface SetUpProps {
  sweep: SweepView;
  setup: SetupView;
  photos: { items: PhotoView[]; next: string | null };
  zone: string;
  /** Whether the reader is one of the lab's people. */
  lab: boolean;
}

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

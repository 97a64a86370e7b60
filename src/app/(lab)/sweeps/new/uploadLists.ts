import type { LimitSetView, PathView } from '@/schemas/bench';
import type { SampleView } from '@/schemas/job';

/** What an upload chooses from. */
export interface UploadLists {
  samples: readonly SampleView[];
  paths: readonly PathView[];
  limitSets: readonly LimitSetView[];
  /** What was tried lately, to choose from. */
  trials: readonly string[];
}

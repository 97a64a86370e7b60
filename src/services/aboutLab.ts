import { unitOfWork } from '@/models/unitOfWork';
import { labSettings, type LabSettings } from './lab';

/** The lab's name and zone, for pages that need no sign-in; nothing in it is secret. */
export function aboutLab(): Promise<LabSettings> {
  return unitOfWork(() => labSettings());
}

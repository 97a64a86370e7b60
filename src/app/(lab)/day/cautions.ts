import type { Capability } from '@/schemas/booking';

export interface Caution {
  title: string;
  text: string;
}

/*
 * The usual cautions of an EMC bench, as common practice has them; no standard is quoted and none is replaced. The AMN's
 * leakage is common practice too: its capacitors to earth pass a current of the order of an ampere at mains frequency,
 * so it trips a residual-current device and makes an unearthed case live.
 */
const CAUTIONS: Partial<Record<Capability, Caution>> = {
  'mains-network': {
    title: 'Mains and protective earth',
    text:
      'An AMN passes a large leakage current to protective earth. Bond it to the ground plane with its own earth before ' +
      'mains is connected, and take mains off first. Residual-current devices trip; an isolating transformer is the ' +
      'usual way, chosen by somebody licensed for mains work.',
  },
  'shielded-room': {
    title: 'Chamber door',
    text:
      'Nobody stays inside while the EUT is powered unless the lab has arranged for it. Look before you close the door, ' +
      'and see that it opens from inside.',
  },
  'turntable-and-mast': {
    title: 'Turntable and mast',
    text: 'Stop both before anybody enters. Mind the leads as the table turns; lift heavy samples with two people.',
  },
  'rf-field': {
    title: 'RF fields',
    text: 'Fields are made here on purpose. Keep the door interlock working and stay out while the amplifier is on.',
  },
};

/** What to mind at a position before starting, and the rule above all of it; empty where nothing of the kind is there. */
export function cautionsFor(capabilities: readonly Capability[]): Caution[] {
  return capabilities.flatMap((word) => CAUTIONS[word] ?? []);
}

export const LOCAL_RULES =
  'The lab’s own instructions and the local rules come first; mains work is for licensed people.';

export const CAPABILITY_WORDS: Record<Capability, string> = {
  radiated: 'radiated emission',
  conducted: 'conducted emission',
  'magnetic-field': 'magnetic field',
  'common-mode-current': 'common-mode current',
  'mains-network': 'AMN on mains',
  'shielded-room': 'shielded room',
  'turntable-and-mast': 'turntable and mast',
  'rf-field': 'RF fields',
};

import { letter, oneLine } from './letter';
import type { Mail } from './message';
import { type LinkLetter, nobodyAsks, until } from './resetMail';

export interface InvitationLetter extends LinkLetter {
  role: 'manager' | 'technician' | 'designer';
  /** Whose records they will see; the lab's own people see all. */
  organisation: string;
}

/** The link to a first password: which lab, as what, what they will see, until when. */
export function invitationMail({ lab, zone, to, url, expiresAt, role, organisation }: InvitationLetter): Mail {
  const sees =
    role === 'designer'
      ? `You will see what ${lab} measures for ${organisation}: sweeps, margins to the limit lines and what comes next.`
      : `You will work there as ${role} of ${lab}.`;
  return {
    to,
    subject: `${lab}: your invitation to Stillfield`,
    ...letter([
      `${oneLine(to.name)},`,
      `${lab} has entered you as ${role} at Stillfield, its working record. ${sees}`,
      { link: url, says: 'Choose a password and sign in' },
      `The link works once, until ${until(expiresAt, zone)}. After that, ask the lab for a new one. Your sign-in is ` +
        `${to.address}.`,
      'If you do not know this lab, do nothing: without a password nobody can sign in as you.',
      nobodyAsks(lab),
    ]),
  };
}

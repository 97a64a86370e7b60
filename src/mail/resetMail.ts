import { formatDayTime } from '@/format/dates';
import { letter, oneLine } from './letter';
import type { Mail } from './message';

export interface LinkLetter {
  lab: string;
  /** IANA zone in which the lab tells times. */
  zone: string;
  to: Mail['to'];
  url: string;
  expiresAt: Date;
}

/** The sentence every letter with a link ends on. */
export function nobodyAsks(lab: string): string {
  return `Nobody at ${lab} asks for your password, in writing, on the telephone or in person.`;
}

export const until = (expiresAt: Date, zone: string): string =>
  `${formatDayTime(expiresAt, zone)} (${zone.replaceAll('_', ' ')} time)`;

/** The link to a new password: which lab, what to do, until when, and what to do if nobody asked. */
export function resetMail({ lab, zone, to, url, expiresAt }: LinkLetter): Mail {
  return {
    to,
    subject: `${lab}: choose a new password`,
    ...letter([
      `${oneLine(to.name)},`,
      `a new password was asked for at Stillfield, the working record of ${lab}, for ${to.address}.`,
      { link: url, says: 'Choose a new password' },
      `The link works once, until ${until(expiresAt, zone)}; asking again ends it. A new password signs you out ` +
        'wherever you are signed in.',
      'If you did not ask, do nothing: your password stays as it is. If it happens again, tell the lab.',
      nobodyAsks(lab),
    ]),
  };
}

'use client';

import { Button } from '@/components/ui/Button';
import { Message } from '@/components/ui/Message';
import { Notice } from './Notice';
import type { Recovery } from './useRecovery';

const LONG_MS = 5 * 60_000;
const clock = new Intl.DateTimeFormat('en-GB', { timeStyle: 'medium' });

/** Says what is certain while the database is gone; the page comes back by itself. */
export function DatabaseGone({ asked, askedAt, since, askNow }: Recovery) {
  const long = since !== null && askedAt !== null && askedAt.getTime() - since.getTime() > LONG_MS;
  return (
    <Notice title="The database does not answer" actions={<Button onClick={askNow}>Ask now</Button>}>
      <Message tone="inconclusive" lead="Nothing that was acknowledged is lost." className="mt-2">
        Runs that were kept are kept, and you stay signed in. This page comes back by itself as soon as the database
        does.
      </Message>
      <p className="mt-4" role="status">
        {askedAt === null
          ? 'Asking whether it is back.'
          : `Asked ${asked === 1 ? 'once' : `${asked} times`}, last at ${clock.format(askedAt)}; asked again within ten seconds.`}
      </p>
      {long && <p className="mt-4">It has been gone for more than five minutes: tell whoever runs the lab’s server.</p>}
    </Notice>
  );
}

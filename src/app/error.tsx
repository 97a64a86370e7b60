'use client';

import { Button } from '@/components/ui/Button';
import { DatabaseGone } from './DatabaseGone';
import { Notice } from './Notice';
import { useRecovery } from './useRecovery';

/** What the service layer writes on an error that means that the database is gone. */
const GONE = 'database-gone';

/**
 * A page that could not be made. When that is because the database does not answer it says so and comes back by itself;
 * otherwise the digest is what the lab's log holds beside the cause.
 */
export default function PageError({ error }: { error: Error & { digest?: string } }) {
  const known = error.digest === GONE;
  const recovery = useRecovery(known);
  if (known || recovery.gone) return <DatabaseGone {...recovery} />;
  return (
    <Notice
      title="This page could not be shown"
      actions={
        <Button kind="primary" onClick={() => window.location.reload()}>
          Load it again
        </Button>
      }
    >
      <p>
        Nothing was changed by looking at it. The lab’s log holds the cause
        {error.digest ? (
          <>
            {' '}
            under <span className="t-id">{error.digest}</span>
          </>
        ) : null}
        .
      </p>
    </Notice>
  );
}

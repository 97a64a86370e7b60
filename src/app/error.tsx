'use client';

import { Button } from '@/components/ui/Button';
import { Notice } from './Notice';

/** A page that could not be made. The digest is what the lab's log holds beside the cause. */
export default function PageError({ error }: { error: Error & { digest?: string } }) {
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
        Nothing was changed. The database may not answer just now; the lab’s log holds the cause
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

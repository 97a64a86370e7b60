'use client';

import PageError from './error';
import './globals.css';

/** Stands in when the root layout itself fails, so it brings its own document; the room is not known here. */
export default function GlobalError({ error }: { error: Error & { digest?: string } }) {
  return (
    <html lang="en">
      <body>
        <title>Not shown · Stillfield</title>
        <PageError error={error} />
      </body>
    </html>
  );
}

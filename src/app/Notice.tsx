import type { ReactNode } from 'react';

/** A page that has nothing of its own to show: the line, the wordmark, and a sheet with what happened and the way on. */
export function Notice({ title, children, actions }: { title: string; children: ReactNode; actions?: ReactNode }) {
  return (
    <>
      <header className="top">
        {/* A full load: whatever went wrong on this page does not come along. */}
        {/* eslint-disable-next-line @next/next/no-html-link-for-pages */}
        <a className="top-word" href="/">
          Stillfield
        </a>
      </header>
      <div className="sheet">
        <main className="sheet-main" id="sheet">
          <h1 className="t-title">{title}</h1>
          <div className="t-finding mt-2 max-w-prose">{children}</div>
          {actions && <div className="mt-5 flex flex-wrap gap-2">{actions}</div>}
        </main>
      </div>
    </>
  );
}

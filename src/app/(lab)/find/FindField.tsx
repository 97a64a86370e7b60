'use client';

import { useRouter } from 'next/navigation';
import { useState, useTransition, type FormEvent } from 'react';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import './find.css';

/** The words to find; Enter looks, and arrow down goes to the first row found. */
export function FindField({ q, lab }: { q: string; lab: boolean }) {
  const router = useRouter();
  const [typed, setTyped] = useState(q);
  const [looking, startLooking] = useTransition();
  useKey('ArrowDown', () => move(1), { says: 'next found', weak: true });
  useKey('ArrowUp', () => move(-1), { says: 'found before', weak: true });

  function look(event: FormEvent) {
    event.preventDefault();
    const words = typed.trim();
    if (words) startLooking(() => router.replace(`/find?${new URLSearchParams({ q: words })}`));
  }
  return (
    <form
      action="/find"
      role="search"
      onSubmit={look}
      className="mt-4 flex flex-wrap items-start gap-2"
      onKeyDown={(event) => {
        if (event.key !== 'ArrowDown') return;
        event.preventDefault();
        move(1);
      }}
    >
      <Field
        label="Number, serial or words"
        name="q"
        type="search"
        value={typed}
        onChange={(event) => setTyped(event.target.value)}
        keyName="/"
        autoFocus
        autoComplete="off"
        maxLength={120}
        className="w-full max-w-[33rem] grow"
        hint={
          lab
            ? 'Such as HL-2611, S-047, R-26-032, a serial, LD-40, ANT-02, P-3, a file name; LISN finds the AMN.'
            : 'Such as a job, sample or run number, a serial, a product code, a file name.'
        }
      />
      <Button kind="primary" type="submit" busy={looking} className="find-look">
        Find
      </Button>
    </form>
  );
}

/** The rows found, in the order of the page. */
function move(by: 1 | -1): void {
  const rows = [...document.querySelectorAll<HTMLAnchorElement>('.find-row')];
  const at = rows.indexOf(document.activeElement as HTMLAnchorElement);
  rows[Math.max(0, at + by)]?.focus();
}

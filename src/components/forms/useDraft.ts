'use client';

import { useCallback, useEffect, useState } from 'react';

/**
 * What is typed into a form, kept in this tab until it is sent or left: a reload, or a page that had to be made anew
 * because the database was gone, finds it again. `key` names the form and its record. Holds plain data only.
 */
export function useDraft<T extends object>(key: string, initial: () => T): readonly [T, (next: T) => void, () => void] {
  const name = `draft ${key}`;
  const [draft, setDraft] = useState<T>(() => ({ ...initial(), ...read(name) }));
  useEffect(() => {
    try {
      sessionStorage.setItem(name, JSON.stringify(draft));
    } catch {
      // A browser that keeps nothing; what is typed still stands in the form.
    }
  }, [name, draft]);
  const forget = useCallback(() => {
    // After the last write above.
    setTimeout(() => sessionStorage.removeItem(name), 0);
  }, [name]);
  return [draft, setDraft, forget];
}

function read(name: string): object {
  try {
    const kept: unknown = JSON.parse(sessionStorage.getItem(name) ?? '{}');
    return typeof kept === 'object' && kept !== null ? kept : {};
  } catch {
    return {};
  }
}

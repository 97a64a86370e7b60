'use client';

import { useEffect } from 'react';
import { useRouter } from 'next/navigation';

const EVERY_MS = 3000;
const TIMES = 10;

/** While an e-mail is on its way, looks again for half a minute what became of it. */
export function WatchMail() {
  const router = useRouter();
  useEffect(() => {
    let looked = 0;
    const timer = setInterval(() => {
      looked += 1;
      if (looked >= TIMES) clearInterval(timer);
      router.refresh();
    }, EVERY_MS);
    return () => clearInterval(timer);
  }, [router]);
  return null;
}

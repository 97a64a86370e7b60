import type { Metadata, Viewport } from 'next';
import type { ReactNode } from 'react';
import { cookies, headers } from 'next/headers';
import { ROOM_COOKIE, roomOf } from '@/components/shell/room';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Stillfield', template: '%s · Stillfield' },
  description: 'The working record of an EMC pre-compliance lab',
  robots: { index: false, follow: false },
  // Frequencies and serial numbers look like telephone numbers to a phone.
  formatDetection: { telephone: false, address: false, email: false, date: false },
};

export const viewport: Viewport = { width: 'device-width', initialScale: 1 };

/** The room belongs to the device, not to the person: it is a cookie the browser sets, read before the first paint. */
export default async function RootLayout({ children }: { children: ReactNode }) {
  // Reading the request makes every page render for it, which a nonce of its own needs.
  await headers();
  const room = roomOf((await cookies()).get(ROOM_COOKIE)?.value);
  return (
    <html lang="en" data-room={room === 'dim' ? 'dim' : undefined} suppressHydrationWarning>
      <body>{children}</body>
    </html>
  );
}

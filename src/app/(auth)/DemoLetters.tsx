import Link from 'next/link';

/** Where the demo's e-mail is read; shown while it is caught and goes nowhere. */
export function DemoLetters() {
  return (
    <>
      Demo: e-mail is caught here and goes nowhere. <Link href="/letters">Read the letters</Link>
    </>
  );
}

import { classes } from './classes';

const SHOWN: Record<string, string> = { Escape: 'Esc' };

/** A key as it is printed on a keyboard. Decoration: the control it belongs to says the key by aria-keyshortcuts. */
export function KeyHint({ name, className }: { name: string; className?: string }) {
  return (
    <kbd className={classes('key', className)} aria-hidden>
      {ARROWS[name] ? <Arrow path={ARROWS[name]} /> : (SHOWN[name] ?? name)}
    </kbd>
  );
}

/** Neither face has a right arrow (design, section 4), so all four are drawn. */
const ARROWS: Record<string, string> = {
  ArrowUp: 'M5 9V1M2 4l3-3 3 3',
  ArrowDown: 'M5 1v8M2 6l3 3 3-3',
  ArrowLeft: 'M9 5H1M4 2 1 5l3 3',
  ArrowRight: 'M1 5h8M6 2l3 3-3 3',
};

function Arrow({ path }: { path: string }) {
  return (
    <svg width="10" height="10" viewBox="0 0 10 10" aria-hidden>
      <path d={path} fill="none" stroke="currentColor" strokeWidth="1.2" />
    </svg>
  );
}

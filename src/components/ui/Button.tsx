import type { ComponentProps, ReactNode } from 'react';
import Link from 'next/link';
import { classes } from './classes';
import { KeyHint } from './KeyHint';

export type ButtonKind = 'primary' | 'plain' | 'quiet' | 'unavailable';

interface Look {
  kind?: ButtonKind;
  /** 34 px; `table` 28, `tall` 38 (sign-in). */
  size?: 'page' | 'table' | 'tall';
  /** The key that presses it, as `KeyboardEvent.key` names it. The key works wherever the shell is mounted. */
  keyName?: string;
  children: ReactNode;
}

export interface ButtonProps extends Look, Omit<ComponentProps<'button'>, 'children'> {
  /** While true it cannot be pressed again, keeps its focus and says so. */
  busy?: boolean;
}

/** A button is the act and its extent: `Measure 3 finals`. One that is unavailable says what it waits for. */
export function Button({
  kind = 'plain',
  size,
  keyName,
  busy,
  className,
  type,
  onClick,
  children,
  ...rest
}: ButtonProps) {
  const still = kind === 'unavailable' || busy;
  return (
    <button
      type={still ? 'button' : (type ?? 'button')}
      className={look(kind, size, className)}
      onClick={still ? undefined : onClick}
      {...(kind === 'unavailable' && { 'aria-disabled': true })}
      {...(busy && { 'aria-busy': true, 'aria-disabled': true })}
      {...pressedBy(still ? undefined : keyName)}
      {...rest}
    >
      {children}
      {keyName && <KeyHint name={keyName} />}
    </button>
  );
}

export interface ButtonLinkProps extends Look, Omit<ComponentProps<typeof Link>, 'children'> {
  kind?: Exclude<ButtonKind, 'unavailable'>;
}

/** The same look where pressing goes somewhere. */
export function ButtonLink({ kind = 'plain', size, keyName, className, children, ...rest }: ButtonLinkProps) {
  return (
    // A page costs the bench's small server a render; it is made when it is asked for.
    <Link prefetch={false} className={look(kind, size, className)} {...pressedBy(keyName)} {...rest}>
      {children}
      {keyName && <KeyHint name={keyName} />}
    </Link>
  );
}

function look(kind: ButtonKind, size: Look['size'], className: string | undefined): string | undefined {
  return classes('btn', `btn-${kind}`, size && size !== 'page' && `btn-${size}`, className);
}

/** The shell's key listener presses what carries `data-key`; so every key shown in a button is real. */
function pressedBy(keyName: string | undefined) {
  return keyName ? { 'data-key': keyName, 'aria-keyshortcuts': keyName } : {};
}

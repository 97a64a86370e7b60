'use client';

import { useEffect, useRef, useSyncExternalStore } from 'react';

/**
 * Single keys of the shell. One listener looks first for what a component registered with `useKey`, newest first, then
 * for a visible control that carries `data-key` and presses it. It is silent while a field has the focus, while a
 * modal dialog hides the control, and when the person has turned single keys off on this device.
 */

/** Answer `false` to pass the key on to the one registered before. */
export type KeyHandler = (event: KeyboardEvent) => void | boolean;

export interface KeyOptions {
  /** For the list under `?`: `margin or level`. */
  says?: string;
  /** Asked only when nobody else takes the key. */
  weak?: boolean;
  /** Also while a modal dialog is open. */
  inDialog?: boolean;
  /** Not registered while false. */
  when?: boolean;
}

interface Registration extends KeyOptions {
  key: string;
  handler: KeyHandler;
}

const registered: Registration[] = [];
const watchers = new Set<() => void>();
const STORED = 'stillfield-keys';
let listening = false;

/** Letters are compared without case, so that Caps Lock does not matter. */
function sameKey(one: string, other: string): boolean {
  return one.toLowerCase() === other.toLowerCase();
}

const TYPED_IN = 'input, select, textarea, [contenteditable=""], [contenteditable="true"]';
/** These take Enter and Space themselves. */
const PRESSED = 'button, a[href], summary, [role="button"], [role="tab"], [role="menuitem"], [role="option"]';

function isOurs(event: KeyboardEvent): boolean {
  if (event.defaultPrevented || event.isComposing) return false;
  const graph = event.getModifierState('AltGraph');
  if ((event.ctrlKey || event.altKey || event.metaKey) && !graph) return false;
  const target = event.target instanceof Element ? event.target : null;
  if (event.key === 'Escape') return true;
  if (!keysEnabled()) return false;
  if (target?.closest(TYPED_IN) && !isButtonLike(target)) return false;
  return !((event.key === 'Enter' || event.key === ' ') && target?.closest(PRESSED));
}

function isButtonLike(target: Element): boolean {
  return target instanceof HTMLInputElement && ['button', 'submit', 'reset', 'checkbox'].includes(target.type);
}

function onKeyDown(event: KeyboardEvent): void {
  if (!isOurs(event)) return;
  const dialog = [...document.querySelectorAll<HTMLDialogElement>('dialog[open]')].at(-1) ?? null;
  const takers = [...registered].reverse().filter((one) => sameKey(one.key, event.key) && (!dialog || one.inDialog));
  for (const taker of [...takers.filter(({ weak }) => !weak), ...takers.filter(({ weak }) => weak)]) {
    if (taker.handler(event) === false) continue;
    event.preventDefault();
    return;
  }
  // A modal dialog closes itself on Escape; pressing its button as well would close two things.
  if (event.repeat || (dialog && event.key === 'Escape')) return;
  const control = [...(dialog ?? document).querySelectorAll<HTMLElement>('[data-key]')].find(
    (one) => sameKey(one.dataset.key ?? '', event.key) && isReachable(one),
  );
  if (!control) return;
  event.preventDefault();
  control.focus();
  if (!control.matches('input:not([type="checkbox"], [type="radio"]), select, textarea')) control.click();
}

function isReachable(control: HTMLElement): boolean {
  return control.checkVisibility?.({ visibilityProperty: true }) !== false && !control.closest('[inert]');
}

function listen(): void {
  if (listening) return;
  listening = true;
  document.addEventListener('keydown', onKeyDown);
  document.documentElement.dataset.keys = 'heard';
}

/** Mounted once by the top line, so that keys in server-rendered buttons are real before anything registers one. */
export function useKeyListener(): void {
  useEffect(listen, []);
}

/**
 * Registers a single key while the component is mounted, as `KeyboardEvent.key` names it: `useKey('L', toggle)`,
 * `useKey('ArrowDown', next, { says: 'rows' })`.
 */
export function useKey(key: string, handler: KeyHandler, options: KeyOptions = {}): void {
  const latest = useRef(handler);
  const { says, weak, inDialog, when = true } = options;
  useEffect(() => {
    latest.current = handler;
  });
  useEffect(() => {
    if (!when) return;
    listen();
    const registration: Registration = { key, says, weak, inDialog, handler: (event) => latest.current(event) };
    registered.push(registration);
    return () => {
      registered.splice(registered.indexOf(registration), 1);
    };
  }, [key, says, weak, inDialog, when]);
}

export interface ListedKey {
  key: string;
  says: string;
}

/** What works now, for the list under `?`: registered keys that say something, then the keys shown in controls. */
export function listKeys(): ListedKey[] {
  const listed = new Map<string, ListedKey>();
  for (const { key, says } of registered) if (says) listed.set(key.toLowerCase(), { key, says });
  for (const control of document.querySelectorAll<HTMLElement>('[data-key]')) {
    const key = control.dataset.key ?? '';
    if (!isReachable(control) || control.closest('dialog') || listed.has(key.toLowerCase())) continue;
    const says = control.getAttribute('aria-label') ?? wordsOf(control);
    if (says) listed.set(key.toLowerCase(), { key, says });
  }
  return [...listed.values()];
}

function wordsOf(control: HTMLElement): string {
  if (control.matches('input, select, textarea'))
    return (control as HTMLInputElement).labels?.[0]?.textContent?.trim() ?? '';
  const copy = control.cloneNode(true) as HTMLElement;
  for (const hint of copy.querySelectorAll('kbd')) hint.remove();
  return copy.textContent?.trim() ?? '';
}

function keysEnabled(): boolean {
  try {
    return localStorage.getItem(STORED) !== 'off';
  } catch {
    return true;
  }
}

/** Whether single keys are on for this device, and the way to turn them. */
export function useKeysEnabled(): [boolean, (on: boolean) => void] {
  const on = useSyncExternalStore(watch, keysEnabled, () => true);
  return [on, turnKeys];
}

function turnKeys(on: boolean): void {
  try {
    localStorage.setItem(STORED, on ? 'on' : 'off');
  } catch {
    // A browser that keeps nothing keeps the keys on.
  }
  for (const watcher of watchers) watcher();
}

function watch(changed: () => void): () => void {
  watchers.add(changed);
  window.addEventListener('storage', changed);
  return () => {
    watchers.delete(changed);
    window.removeEventListener('storage', changed);
  };
}

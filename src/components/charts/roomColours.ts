'use client';

import { useSyncExternalStore } from 'react';

/** Colours a canvas needs as values; everything in SVG takes them from the style sheet. */
export interface RoomColours {
  ink: string;
  ink3: string;
  /** ink at 5 %; transparent where ink is a system colour (forced colours). */
  fill: string;
}

function subscribe(changed: () => void): () => void {
  const watcher = new MutationObserver(changed);
  watcher.observe(document.documentElement, { attributes: true, attributeFilter: ['data-room', 'class'] });
  const forced = window.matchMedia('(forced-colors: active)');
  const print = window.matchMedia('print');
  forced.addEventListener('change', changed);
  print.addEventListener('change', changed);
  return () => {
    watcher.disconnect();
    forced.removeEventListener('change', changed);
    print.removeEventListener('change', changed);
  };
}

const read = () => {
  const style = getComputedStyle(document.documentElement);
  if (window.matchMedia('(forced-colors: active)').matches) return 'CanvasText|GrayText';
  return `${style.getPropertyValue('--ink').trim()}|${style.getPropertyValue('--ink3').trim()}`;
};

/** The two line colours of the room this device is set to, read again whenever `data-room` changes. */
export function useRoomColours(): RoomColours {
  const [ink = '', ink3 = ''] = useSyncExternalStore(subscribe, read, () => '|').split('|');
  return { ink, ink3, fill: /^#[0-9a-f]{6}$/i.test(ink) ? `${ink}0d` : 'transparent' };
}

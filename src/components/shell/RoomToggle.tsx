'use client';

import { useSyncExternalStore } from 'react';
import { ROOM_COOKIE, type Room } from './room';

export type { Room };

const watchers = new Set<() => void>();

/**
 * Paper or dim room, for this device and not for the person: a bench PC in the chamber stays dim whoever signs in. The
 * root layout reads the cookie and sets `data-room` on <html>; here it changes without a request.
 */
export function RoomToggle({ room, className }: { room: Room; className?: string }) {
  const now = useSyncExternalStore(watch, readRoom, () => room);
  const other: Room = now === 'dim' ? 'paper' : 'dim';
  return (
    <button type="button" className={className} onClick={() => enterRoom(other)}>
      {other === 'dim' ? 'Dim room' : 'Paper'}
    </button>
  );
}

function readRoom(): Room {
  return document.documentElement.dataset.room === 'dim' ? 'dim' : 'paper';
}

function enterRoom(room: Room): void {
  if (room === 'dim') document.documentElement.dataset.room = 'dim';
  else delete document.documentElement.dataset.room;
  const secure = location.protocol === 'https:' ? '; secure' : '';
  document.cookie = `${ROOM_COOKIE}=${room}; path=/; max-age=34560000; samesite=lax${secure}`;
  for (const watcher of watchers) watcher();
}

function watch(changed: () => void): () => void {
  watchers.add(changed);
  return () => watchers.delete(changed);
}

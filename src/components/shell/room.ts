/** The look of the page: `paper`, or `dim` for a screen beside a chamber door. */
export type Room = 'paper' | 'dim';

export const ROOM_COOKIE = 'room';

/** What the cookie says; anything but `dim` is paper. For the root layout: `<html data-room={room === 'dim' ? 'dim' : undefined}>`. */
export function roomOf(cookie: string | undefined): Room {
  return cookie === 'dim' ? 'dim' : 'paper';
}

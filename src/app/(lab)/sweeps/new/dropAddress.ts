/** What the address of a drop names: the files the lab holds, and which of them is open. */
export interface DropAddress {
  ids: readonly string[];
  open: string | null;
  /** The modification state that the drop was begun for. */
  stateId: string | null;
}

export function addressOf({ ids, open, stateId }: DropAddress): string {
  const query = new URLSearchParams(ids.map((id) => ['file', id]));
  if (open) query.set('open', open);
  if (stateId) query.set('state', stateId);
  const text = query.toString();
  return text === '' ? '/sweeps/new' : `/sweeps/new?${text}`;
}

export function goTo(address: DropAddress, how: 'push' | 'replace'): void {
  if (how === 'push') window.history.pushState(null, '', addressOf(address));
  else window.history.replaceState(null, '', addressOf(address));
}

/** The files that the address names now. */
export function here(): string[] {
  return new URLSearchParams(window.location.search).getAll('file');
}

export function openHere(): string | null {
  return new URLSearchParams(window.location.search).get('open');
}

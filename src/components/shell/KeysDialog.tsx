'use client';

import { useSyncExternalStore } from 'react';
import { Dialog } from '@/components/ui/Dialog';
import { KeyHint } from '@/components/ui/KeyHint';
import { Switch } from '@/components/ui/Switch';
import { listKeys, useKey, useKeyListener, useKeysEnabled, type ListedKey } from './keys';

let shown: readonly ListedKey[] | null = null;
const watchers = new Set<() => void>();

function show(keys: readonly ListedKey[] | null): void {
  shown = keys;
  for (const watcher of watchers) watcher();
}

function watch(changed: () => void): () => void {
  watchers.add(changed);
  return () => watchers.delete(changed);
}

/** The way to the keys by mouse, and the only one when single keys are off. */
export function KeysButton({ className }: { className?: string }) {
  return (
    <button type="button" className={className} onClick={() => show(listKeys())}>
      Keys <KeyHint name="?" />
    </button>
  );
}

/** `?` shows every key that works on this sheet, and whether they are on at all. */
export function KeysDialog() {
  const keys = useSyncExternalStore(
    watch,
    () => shown,
    () => null,
  );
  const [on, turn] = useKeysEnabled();
  useKeyListener();
  useKey('?', () => show(listKeys()), { says: 'all keys' });
  return (
    <Dialog open={keys !== null} title="Keys on this sheet" safe="Close" onClose={() => show(null)}>
      <dl className="keys-list">
        {keys?.map(({ key, says }) => (
          <div key={key}>
            <dt>
              <KeyHint name={key} />
              <span className="sr-only">{key}</span>
            </dt>
            <dd>{says}</dd>
          </div>
        ))}
        <div>
          <dt>
            <KeyHint name="Escape" />
            <span className="sr-only">Escape</span>
          </dt>
          <dd>close the innermost thing</dd>
        </div>
      </dl>
      <div>
        <Switch
          legend="Single keys on this device"
          shown
          choices={[
            { value: 'on', word: 'on' },
            { value: 'off', word: 'off' },
          ]}
          value={on ? 'on' : 'off'}
          onChange={(value) => turn(value === 'on')}
          hint="Keys are silent while you type in a field. Turned off, only Esc works."
        />
      </div>
    </Dialog>
  );
}

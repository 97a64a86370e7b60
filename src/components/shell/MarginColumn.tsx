'use client';

import { useId, type KeyboardEvent, type ReactNode } from 'react';
import { KeyHint } from '@/components/ui/KeyHint';
import { ColumnSection } from './ColumnSection';
import type { MarginKey, MarginSection } from './marginSection';
import { DrawerGrip } from './DrawerGrip';
import { useDrawerDrag } from './drawerDrag';
import { useSheet } from './sheetState';

/** Working, Notes, Custody, History on ruled paper. On screen the column has no name, only its parts have. */
export function MarginColumn({
  sections,
  line,
  keys,
}: {
  sections: readonly MarginSection[];
  line?: ReactNode;
  keys?: readonly MarginKey[];
}) {
  const sheet = useSheet();
  const id = useId();
  const drag = useDrawerDrag(sheet.setReach);
  const drawer = sheet.layout === 'drawer';
  const chosen = sections.find((section) => section.id === sheet.tab) ?? sections[0];
  const away = sheet.layout !== 'column' && sheet.reach === 'closed';

  return (
    <>
      <button
        type="button"
        className="btn btn-plain column-opener"
        aria-expanded={!away}
        aria-controls={id}
        onClick={() => (away ? sheet.open(chosen?.id ?? '', { focus: true }) : sheet.close())}
      >
        {chosen?.title} <KeyHint name="W" />
      </button>
      <aside
        id={id}
        className="column"
        aria-label={sections.map(({ title }) => title).join(', ')}
        data-reach={sheet.reach}
      >
        <DrawerGrip section={chosen} line={line} drag={drag} />
        <div className="column-scroll" inert={drawer && away}>
          <div className="column-paper">
            {sections.map((section) => (
              <ColumnSection key={section.id} section={section} chosen={section === chosen} baseId={id} />
            ))}
          </div>
        </div>
        <div className="column-tabs" role="tablist" aria-label="Parts" onKeyDown={moveAlongTabs}>
          {sections.map((section) => (
            <button
              key={section.id}
              type="button"
              role="tab"
              id={`${id}-${section.id}-tab`}
              className="column-tab"
              aria-selected={section === chosen}
              aria-controls={`${id}-${section.id}`}
              tabIndex={section === chosen ? 0 : -1}
              onClick={() => sheet.open(section.id)}
            >
              {section.title}
              {section.count ? ` ${section.count}` : ''}
            </button>
          ))}
        </div>
        {keys && keys.length > 0 && (
          <ul className="column-keys">
            {keys.map((hint) => (
              <li key={hint.does}>
                {hint.keys.map((key) => (
                  <span key={key}>
                    <KeyHint name={key} />
                    <span className="sr-only">{key} </span>
                  </span>
                ))}{' '}
                {hint.does}
              </li>
            ))}
          </ul>
        )}
      </aside>
    </>
  );
}

/** Arrow keys, Home and End among the tabs, as a tab list has them. */
function moveAlongTabs(event: KeyboardEvent<HTMLDivElement>): void {
  const tabs = [...event.currentTarget.querySelectorAll<HTMLElement>('[role="tab"]')];
  const at = tabs.indexOf(document.activeElement as HTMLElement);
  const to = { ArrowLeft: at - 1, ArrowRight: at + 1, Home: 0, End: tabs.length - 1 }[event.key];
  if (at < 0 || to === undefined) return;
  event.preventDefault();
  const next = tabs[(to + tabs.length) % tabs.length];
  next?.focus();
  next?.click();
}

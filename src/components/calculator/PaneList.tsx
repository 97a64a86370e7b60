'use client';

import { SelectField } from '@/components/ui/Field';
import { PANES, paneOf } from './panes';
import type { Calculator } from './useCalculator';

/** The calculations by name: a list beside the open one, on a phone one field above it. */
export function PaneList({ calculator }: { calculator: Calculator }) {
  const { pane, hrefOf, goTo } = calculator;
  return (
    <>
      <nav className="calc-list" aria-label="Calculations">
        <ul>
          {PANES.map((one) => (
            <li key={one.id}>
              {/* a plain link: opened in a tab of its own it leads there too */}
              <a
                href={hrefOf(one)}
                aria-current={one === pane ? 'page' : undefined}
                onClick={(event) => {
                  if (event.ctrlKey || event.metaKey || event.shiftKey || event.altKey) return;
                  event.preventDefault();
                  goTo(one);
                }}
              >
                {one.title}
              </a>
            </li>
          ))}
        </ul>
      </nav>
      <SelectField
        className="calc-choose"
        label="Calculation"
        value={pane.id}
        onChange={(event) => goTo(paneOf(event.currentTarget.value))}
      >
        {PANES.map(({ id, title }) => (
          <option key={id} value={id}>
            {title}
          </option>
        ))}
      </SelectField>
    </>
  );
}

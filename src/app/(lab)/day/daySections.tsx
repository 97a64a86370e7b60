import type { MarginSection } from '@/components/shell/marginSection';
import type { PositionView } from '@/schemas/booking';
import { CAPABILITY_WORDS, cautionsFor, LOCAL_RULES } from './cautions';

/** What to mind at the chosen booking's position before anything is switched on. */
export function beforeSection(position: PositionView | null): MarginSection {
  const cautions = position ? cautionsFor(position.capabilities) : [];
  return {
    id: 'before',
    title: 'Before you start',
    subject: position ? `at position ${position.code}` : undefined,
    children: (
      <>
        {cautions.length > 0 && (
          <ul>
            {cautions.map(({ title, text }) => (
              <li key={title} className="mb-[var(--ruling)]">
                <strong className="block">{title}</strong>
                {text}
              </li>
            ))}
          </ul>
        )}
        <p className="column-quiet">
          {position &&
            cautions.length === 0 &&
            `Position ${position.code} has no mains network or chamber of its own. `}
          {LOCAL_RULES}
        </p>
      </>
    ),
  };
}

/** The lab's positions and what each is good for. */
export function positionsSection(positions: readonly PositionView[]): MarginSection {
  return {
    id: 'positions',
    title: 'Positions',
    summary: positions.map(({ code }) => code).join(', ') || 'none yet',
    children: (
      <ul>
        {positions.map(({ id, code, name, description, capabilities, state }) => (
          <li key={id}>
            <strong>
              {code}, {name}
            </strong>
            {state === 'retired' && ', retired'}
            <span className="column-quiet block">
              {description}
              {capabilities.length > 0 && ` (${capabilities.map((word) => CAPABILITY_WORDS[word]).join(', ')})`}
            </span>
          </li>
        ))}
      </ul>
    ),
  };
}

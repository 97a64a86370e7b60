'use client';

import { KeyHint } from '@/components/ui/KeyHint';
import { useKey } from './keys';
import type { MarginSection } from './marginSection';
import { useSheet } from './sheetState';

/** One part of the column: open, or folded to one line with its summary; on a phone the panel of its tab. */
export function ColumnSection({
  section,
  chosen,
  baseId,
}: {
  section: MarginSection;
  chosen: boolean;
  baseId: string;
}) {
  const sheet = useSheet();
  const drawer = sheet.layout === 'drawer';
  const folds = section.summary !== undefined && section.children !== undefined;
  const open = section.children !== undefined && (!folds || sheet.isOpen(section.id, section.open ?? false));
  const id = `${baseId}-${section.id}`;
  const { onClose } = section;
  useKey('Escape', () => onClose?.(), { when: onClose !== undefined && !(drawer && sheet.reach !== 'closed') });

  return (
    <section
      id={id}
      className="column-section"
      data-section={section.id}
      data-open={open || undefined}
      data-chosen={chosen || undefined}
      {...(drawer ? { role: 'tabpanel', 'aria-labelledby': `${id}-tab` } : { 'aria-labelledby': `${id}-title` })}
    >
      <div className="column-head" {...(open && section.id === 'working' && { 'data-tie': 'heading' })}>
        <h2 className="column-title" id={`${id}-title`} tabIndex={-1}>
          {folds ? (
            <button
              type="button"
              aria-expanded={open}
              aria-controls={`${id}-body`}
              onClick={() => sheet.fold(section.id, !open)}
            >
              {section.title}
            </button>
          ) : (
            section.title
          )}
        </h2>
        {section.subject && (
          <span className="column-subject" hidden={!open && !drawer}>
            {section.subject}
          </span>
        )}
        {!open && section.summary && <span className="column-summary">{section.summary}</span>}
        {open && section.remark && <span className="column-remark">{section.remark}</span>}
        {open && onClose && (
          <button type="button" className="column-close" aria-label={`Esc, close ${section.title}`} onClick={onClose}>
            <KeyHint name="Escape" />
          </button>
        )}
      </div>
      {section.children !== undefined && (
        <div className="column-fold" id={`${id}-body`} inert={!open && !drawer}>
          <div className="column-body">{section.children}</div>
        </div>
      )}
    </section>
  );
}

import type { MarginSection } from '@/components/shell/marginSection';
import { Notes, type About, type NotesPage } from './Notes';

/** The Notes of a record, for its column. */
export function notesSection(about: About, page: NotesPage, zone: string, lab: boolean): MarginSection {
  const last = page.items[0];
  return {
    id: 'notes',
    title: 'Notes',
    summary: last ? `${last.text.slice(0, 40)}${last.text.length > 40 ? '…' : ''}` : 'none yet',
    ...(page.items.length > 0 && { count: page.items.length, open: true }),
    children: <Notes about={about} first={page} zone={zone} lab={lab} />,
  };
}

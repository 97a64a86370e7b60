import { handle } from '@/http/handle';
import * as operations from '@/schemas/note';
import { createNote, listNotes } from '@/services/notes';

export const GET = handle(operations.listNotes, ({ actor, query }) => listNotes(actor, query));
export const POST = handle(operations.createNote, ({ actor, body }) => createNote(actor, body));

import { OutboxMessage } from '@/models/outboxMessage';
import { unitOfWork } from '@/models/unitOfWork';
import type { MailState } from '@/schemas/mailState';

/**
 * What became of e-mails, by the row id that `queueMail` answered. The caller has shown that it may see the records
 * they were asked for by. Rows that are gone are left out.
 */
export async function mailStateOf(outboxIds: readonly number[]): Promise<Map<number, MailState>> {
  if (outboxIds.length === 0) return new Map();
  return unitOfWork(async () => {
    const rows = await OutboxMessage.findAll({
      attributes: ['id', 'state', 'attempts', 'doneAt', 'availableAt', 'lastError'],
      where: { id: [...outboxIds] },
    });
    return new Map(rows.map((row) => [Number(row.id), view(row)]));
  });
}

function view(row: OutboxMessage): MailState {
  return {
    state: row.state,
    attempts: row.attempts,
    doneAt: row.doneAt?.toISOString() ?? null,
    nextTryAt: row.state === 'queued' ? row.availableAt.toISOString() : null,
    reason: row.lastError,
  };
}

import { problemResponse } from '@/http/problem';
import { missingMigrations } from '@/services/readiness';

/** Whether this process may be sent requests: the database answers and its schema is the one this build knows. */
export async function GET(): Promise<Response> {
  try {
    const missing = await missingMigrations();
    if (missing.length === 0) return Response.json({ ready: true }, { headers: { 'cache-control': 'no-store' } });
    return problemResponse(
      'unavailable',
      `Run the migrations: ${missing.length} are not applied, first ${missing[0]}.`,
      {},
      { 'retry-after': '10' },
    );
  } catch {
    return problemResponse('unavailable', 'The database does not answer.', {}, { 'retry-after': '2' });
  }
}

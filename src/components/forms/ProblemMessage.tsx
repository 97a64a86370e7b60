import { Message } from '@/components/ui/Message';
import { wholeFormIssues, type Problem } from './problem';

/** Where it was refused, what, and the next step. What belongs to a field stands at the field. */
export function ProblemMessage({ problem, className }: { problem: Problem | null; className?: string }) {
  if (!problem) return null;
  const lead = stopped(problem.title);
  const kept =
    problem.status === 503 && !problem.detail?.includes('still here') ? 'What you entered is still here.' : null;
  const rest = [problem.detail, kept, ...wholeFormIssues(problem)].filter((text) => text !== null).map(stopped);
  return (
    <Message
      tone={problem.waiting ? 'inconclusive' : 'over'}
      lead={lead}
      live={problem.status === 0 && !problem.waiting ? 'assertive' : 'polite'}
      className={className}
    >
      {rest.filter((text) => text !== lead).join(' ')}
    </Message>
  );
}

/** A title from the API may come without its full stop. */
function stopped(text: string): string {
  return /[.:;?]$/.test(text.trim()) ? text.trim() : `${text.trim()}.`;
}

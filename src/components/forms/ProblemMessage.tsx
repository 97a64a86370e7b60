import { Message } from '@/components/ui/Message';
import { wholeFormIssues, type Problem } from './problem';

/** Where it was refused, what, and the next step. What belongs to a field stands at the field. */
export function ProblemMessage({ problem, className }: { problem: Problem | null; className?: string }) {
  if (!problem) return null;
  const lead = stopped(problem.title);
  const rest = [problem.detail, ...wholeFormIssues(problem)].filter((text) => text !== null).map(stopped);
  return (
    <Message tone="over" lead={lead} live={problem.status === 0 ? 'assertive' : 'polite'} className={className}>
      {rest.filter((text) => text !== lead).join(' ')}
    </Message>
  );
}

/** A title from the API may come without its full stop. */
function stopped(text: string): string {
  return /[.:;?]$/.test(text.trim()) ? text.trim() : `${text.trim()}.`;
}

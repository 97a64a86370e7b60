import { Button } from '@/components/ui/Button';
import { formatCount } from '@/format/quantities';

interface Props {
  shown: number;
  total: number;
  /** `candidates`, `runs` */
  noun: string;
  onMore?: () => void;
  loading?: boolean;
  pageSize?: number;
}

/** Under a table that does not show everything yet. */
export function MoreLine({ shown, total, noun, onMore, loading = false, pageSize = 50 }: Props) {
  if (shown >= total) return null;
  return (
    <div className="t-detail flex items-center justify-between gap-4 pt-2">
      <span aria-live="polite">
        {formatCount(shown)} of {formatCount(total)} {noun}
      </span>
      {onMore ? (
        <Button size="table" onClick={onMore} busy={loading}>
          Show {formatCount(Math.min(pageSize, total - shown))} more
        </Button>
      ) : null}
    </div>
  );
}

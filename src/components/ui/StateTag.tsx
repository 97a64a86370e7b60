import { classes } from './classes';

/** A luggage tag for a modification state, M0, M1…; dashed while it is planned and not measured. */
export function StateTag({
  label,
  planned = false,
  size = 'row',
  className,
}: {
  label: string;
  planned?: boolean;
  size?: 'row' | 'title';
  className?: string;
}) {
  return (
    <span className={classes('tag', size === 'title' && 'tag-title', planned && 'tag-planned', className)}>
      <span className="sr-only">state </span>
      {label}
      {planned && <span className="sr-only">, planned</span>}
    </span>
  );
}

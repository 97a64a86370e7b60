import { formatBytes, formatCount } from '@/format/quantities';
import { formatDayTime } from '@/format/dates';
import type { PhotoView } from '@/schemas/setup';

/** What is known of the picture, for the column. */
export function photoRecord(photo: PhotoView, zone: string) {
  return {
    id: 'record',
    title: 'Record',
    children: (
      <dl className="column-pair">
        <dt>Kept</dt>
        <dd>
          {formatDayTime(photo.at, zone)}, {photo.by.name}
        </dd>
        <dt>Picture</dt>
        <dd>
          {formatCount(photo.width)} by {formatCount(photo.height)} px, {formatBytes(photo.bytes)}
          <span className="column-quiet block">SHA-256 {photo.sha256.slice(0, 16)}…</span>
        </dd>
        <dt>As sent</dt>
        <dd>
          {formatBytes(photo.sent.bytes)}; not kept, since a camera writes place, time and device into its files
          <span className="column-quiet block">SHA-256 {photo.sent.sha256.slice(0, 16)}…</span>
        </dd>
      </dl>
    ),
  };
}

'use client';

import { useRef, useState } from 'react';
import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { send } from '@/components/forms/send';
import { Button } from '@/components/ui/Button';
import { formatDayTime } from '@/format/dates';
import { photoText } from '@/format/setup';
import type { PhotoView } from '@/schemas/setup';
import { PhotoQueue } from './PhotoQueue';
import { usePhotoQueue } from './usePhotoQueue';

/** What the server takes; a phone that keeps HEIC turns it into JPEG for this list. */
const ACCEPT = 'image/jpeg,image/png,image/webp';

interface Page {
  items: PhotoView[];
  next: string | null;
}

/** Photographs of the set-up, hung side by side; each opens its own page. The lab adds to them. */
export function PhotoStrip({
  sweepId,
  first,
  zone,
  lab,
}: {
  sweepId: string;
  first: Page;
  zone: string;
  lab: boolean;
}) {
  const router = useRouter();
  const files = useRef<HTMLInputElement>(null);
  const camera = useRef<HTMLInputElement>(null);
  const [older, setOlder] = useState<Page>({ items: [], next: first.next });
  const queue = usePhotoQueue(sweepId, () => router.refresh());

  async function more() {
    const query = new URLSearchParams({ limit: '12', after: older.next! });
    const answer = await send<Page>({ method: 'GET', path: `/api/sweeps/${sweepId}/photos?${query}` }, undefined, {});
    if (answer.ok) setOlder({ items: [...older.items, ...answer.reply.items], next: answer.reply.next });
  }
  const picker = {
    type: 'file',
    accept: ACCEPT,
    className: 'sr-only',
    tabIndex: -1,
    onChange: (event: { target: HTMLInputElement }) => {
      queue.choose(event.target.files);
      event.target.value = '';
    },
  } as const;

  return (
    <>
      {first.items.length > 0 && (
        <ul className="photo-strip">
          {[...first.items, ...older.items].map((photo) => (
            <Photo key={photo.id} photo={photo} sweepId={sweepId} zone={zone} />
          ))}
        </ul>
      )}
      {older.next && (
        <button type="button" className="setup-more" onClick={() => void more()}>
          Older photographs
        </button>
      )}
      {lab && (
        <>
          <PhotoQueue {...queue} />
          {!queue.busy && (
            <div className="photo-acts">
              <Button size="table" className="photo-camera" onClick={() => camera.current?.click()}>
                Take a photograph
              </Button>
              <Button size="table" onClick={() => files.current?.click()}>
                {queue.queue.length === 0 ? 'Add photographs' : 'Add more'}
              </Button>
            </div>
          )}
          <input {...picker} ref={camera} capture="environment" aria-label="Photograph from the camera" />
          <input {...picker} ref={files} multiple aria-label="Photographs" />
        </>
      )}
    </>
  );
}

function Photo({ photo, sweepId, zone }: { photo: PhotoView; sweepId: string; zone: string }) {
  const text = photoText(photo.caption);
  return (
    <li className={photo.withdrawn ? 'photo-gone' : undefined}>
      <Link prefetch={false} href={`/sweeps/${sweepId}/photos/${photo.id}`} className="photo-link">
        <span className="photo-frame">
          {/* Sized by the server already, and only for whoever may see it. */}
          {/* eslint-disable-next-line @next/next/no-img-element */}
          <img
            src={`/api/photos/${photo.id}/image?size=small`}
            alt={text}
            width={photo.small.width}
            height={photo.small.height}
            loading="lazy"
          />
        </span>
        <span className="photo-caption text-pen" title={text} aria-hidden>
          {photo.caption === '' ? formatDayTime(photo.at, zone) : text}
        </span>
      </Link>
      {photo.withdrawn && <span className="column-quiet block">withdrawn, for the lab only</span>}
    </li>
  );
}

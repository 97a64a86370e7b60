import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { Id } from '@/components/ui/IdentityLine';
import { Message } from '@/components/ui/Message';
import { formatDayTime } from '@/format/dates';
import { photoText } from '@/format/setup';
import { labZone } from '@/services/lab';
import { readPhoto } from '@/services/photos';
import { readSweep } from '@/services/sweeps';
import { PhotoActs } from './PhotoActs';
import { photoRecord } from './photoRecord';
import '../../setup.css';

export const metadata: Metadata = { title: 'Photograph of a set-up' };

interface Props {
  params: Promise<{ id: string; photo: string }>;
}

/** One photograph, as large as the sheet. */
export default async function PhotoPage({ params }: Props) {
  const actor = await requireActor();
  const { id, photo: photoId } = await params;
  const photo = await found(readPhoto(actor, photoId));
  if (photo.runId !== id) notFound();
  const [run, zone] = await Promise.all([found(readSweep(actor, id)), labZone()]);
  const title = photoText(photo.caption);
  return (
    <Sheet
      header={
        <SheetHeader
          title={title}
          state={{ label: run.state.label }}
          identity={
            <>
              <span>{run.sample.product}</span>
              <span>
                set-up of run <Id>{run.number}</Id>
              </span>
              <span>{formatDayTime(photo.at, zone)}</span>
              <span>{photo.by.name}</span>
            </>
          }
          actions={<ButtonLink href={`/sweeps/${id}`}>Back to {run.number}</ButtonLink>}
        />
      }
      margin={[photoRecord(photo, zone)]}
      marginLine={run.number}
    >
      {photo.withdrawn && (
        <Message tone="inconclusive" lead="Withdrawn: the client does not see it." className="mt-4">
          {photo.withdrawn.reason} {photo.withdrawn.by.name}, {formatDayTime(photo.withdrawn.at, zone)}.
        </Message>
      )}
      <div className="photo-whole">
        {/* Sized by the server already, and only for whoever may see it. */}
        {/* eslint-disable-next-line @next/next/no-img-element */}
        <img src={`/api/photos/${photo.id}/image`} alt={title} width={photo.width} height={photo.height} />
      </div>
      {actor.role !== 'designer' && !photo.withdrawn && <PhotoActs photo={photo} />}
    </Sheet>
  );
}

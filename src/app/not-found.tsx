import type { Metadata } from 'next';
import { ButtonLink } from '@/components/ui/Button';
import { Notice } from './Notice';

export const metadata: Metadata = { title: 'Not here' };

export default function NotFound() {
  return (
    <Notice title="There is nothing at this address" actions={<ButtonLink href="/">Go to your work</ButtonLink>}>
      <p>The address may be cut short, or what stood here belongs to another organisation than yours.</p>
    </Notice>
  );
}

'use client';

import { useTransition } from 'react';
import { useRouter } from 'next/navigation';
import { SelectField } from '@/components/ui/Field';
import { addressOf, type RetestSearch } from './retestQuery';

interface Choice {
  value: string;
  word: string;
}

const STATUSES: Choice[] = [
  { value: 'open', word: 'Open' },
  { value: 'waiting', word: 'Waiting' },
  { value: 'scheduled', word: 'Scheduled' },
  { value: 'measured', word: 'Measured' },
  { value: 'cleared', word: 'Cleared' },
  { value: 'withdrawn', word: 'Withdrawn' },
  { value: 'all', word: 'All' },
];
const REASONS: Choice[] = [
  { value: '', word: 'Any' },
  { value: 'over', word: 'Over' },
  { value: 'needs-final', word: 'Needs a final' },
  { value: 'repeat-prescan', word: 'Repeat the prescan' },
];
const PORTS: Choice[] = [
  { value: '', word: 'Any' },
  { value: 'enclosure', word: 'Enclosure' },
  { value: 'ac-mains', word: 'AC mains' },
  { value: 'wired-network', word: 'Wired network' },
];

/** What is shown; every choice is kept in the address, so that it can be sent to somebody and gone back from. */
export function RetestFilters({ search, products }: { search: RetestSearch; products: readonly Choice[] }) {
  const router = useRouter();
  const [busy, start] = useTransition();
  const choose = (name: keyof RetestSearch) => (value: string) =>
    start(() => router.push(addressOf({ ...search, [name]: value || undefined } as RetestSearch)));
  return (
    <div className="retest-filters" role="group" aria-label="Show" aria-busy={busy}>
      <Choices label="Status" value={search.status} choices={STATUSES} onChange={choose('status')} />
      <Choices label="Reason" value={search.reason ?? ''} choices={REASONS} onChange={choose('reason')} />
      <Choices label="Port" value={search.port ?? ''} choices={PORTS} onChange={choose('port')} />
      {products.length > 0 && (
        <Choices
          label="Product"
          value={search.product ?? ''}
          choices={[{ value: '', word: 'Any' }, ...products]}
          onChange={choose('product')}
        />
      )}
    </div>
  );
}

function Choices({
  label,
  value,
  choices,
  onChange,
}: {
  label: string;
  value: string;
  choices: readonly Choice[];
  onChange: (value: string) => void;
}) {
  return (
    <SelectField label={label} value={value} onChange={(event) => onChange(event.target.value)}>
      {choices.map((choice) => (
        <option key={choice.value} value={choice.value}>
          {choice.word}
        </option>
      ))}
    </SelectField>
  );
}

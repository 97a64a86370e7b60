'use client';

import { useTransition } from 'react';
import { useRouter } from 'next/navigation';
import { SelectField } from '@/components/ui/Field';
import type { OrganisationChoice } from './organisations';

/** Whose people are listed; the address holds the choice. */
export function OrganisationFilter({ choices, of }: { choices: readonly OrganisationChoice[]; of: string }) {
  const router = useRouter();
  const [busy, start] = useTransition();
  return (
    <SelectField
      label="Organisation"
      className="max-w-[22rem]"
      value={of}
      aria-busy={busy}
      onChange={(event) => {
        const { value } = event.target;
        start(() => router.push(value ? `/people?of=${value}` : '/people'));
      }}
    >
      <option value="">everybody</option>
      {choices.map(({ id, name }) => (
        <option key={id} value={id}>
          {name}
        </option>
      ))}
    </SelectField>
  );
}

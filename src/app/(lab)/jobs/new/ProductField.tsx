import { useState } from 'react';
import { send } from '@/components/forms/send';
import { SelectField } from '@/components/ui/Field';
import type { ProductView } from '@/schemas/job';
import { WRITES } from '../writes';

export interface ProductPage {
  items: ProductView[];
  next: string | null;
}

interface Props {
  page: ProductPage;
  onPage: (page: ProductPage) => void;
  value: string;
  onChange: (id: string) => void;
  error?: string | null;
}

/** Products newest first, by client; older ones are fetched as they are asked for. */
export function ProductField({ page, onPage, value, onChange, error }: Props) {
  const [state, setState] = useState<'idle' | 'busy' | 'refused'>('idle');
  const clients = [...new Map(page.items.map(({ organisation }) => [organisation.id, organisation.name]))];

  async function older() {
    setState('busy');
    const { method, path } = WRITES.listProducts;
    const answer = await send<ProductPage>({ method, path: `${path}?limit=200&after=${page.next}` }, undefined, {});
    if (answer.ok) {
      const known = new Set(page.items.map(({ id }) => id));
      onPage({
        items: [...page.items, ...answer.reply.items.filter(({ id }) => !known.has(id))],
        next: answer.reply.next,
      });
    }
    setState(answer.ok ? 'idle' : 'refused');
  }

  return (
    <SelectField
      label="Which product"
      value={value}
      onChange={(event) => onChange(event.target.value)}
      error={error}
      hint={
        page.next && (
          <button type="button" className="text-pen hover:underline" onClick={older} disabled={state === 'busy'}>
            {state === 'refused' ? 'Older products could not be fetched; try again' : 'Fetch older products'}
          </button>
        )
      }
    >
      <option value="">Choose one of {page.items.length}</option>
      {clients.map(([id, name]) => (
        <optgroup key={id} label={name}>
          {page.items
            .filter(({ organisation }) => organisation.id === id)
            .map((product) => (
              <option key={product.id} value={product.id}>
                {product.code}, {product.name}
              </option>
            ))}
        </optgroup>
      ))}
    </SelectField>
  );
}

'use client';

import { CorrectInPlace } from '@/app/(lab)/jobs/CorrectInPlace';
import { WRITES } from '@/app/(lab)/jobs/writes';
import type { ProductView } from '@/schemas/job';

export function CorrectProduct({ product }: { product: ProductView }) {
  const { id, version, code, name, description } = product;
  return (
    <CorrectInPlace
      word="Correct code, name or description"
      what="product"
      operation={WRITES.changeProduct}
      id={id}
      version={version}
      fields={[
        { name: 'code', label: 'Code', value: code },
        { name: 'name', label: 'Name', value: name },
        { name: 'description', label: 'Description', value: description, area: true },
      ]}
      done={`${code} is corrected`}
    />
  );
}

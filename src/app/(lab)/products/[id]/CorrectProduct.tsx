'use client';

import { CorrectForm } from '@/app/(lab)/jobs/CorrectForm';
import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { WRITES } from '@/app/(lab)/jobs/writes';
import type { ProductView } from '@/schemas/job';

export function CorrectProduct({ product }: { product: ProductView }) {
  const { id, version, code, name, description } = product;
  return (
    <div className="mt-2">
      <InPlace
        acts={[
          {
            id: 'correct',
            word: 'Correct code, name or description',
            form: (close) => (
              <CorrectForm
                what="product"
                operation={WRITES.changeProduct}
                id={id}
                version={version}
                fields={[
                  { name: 'code', label: 'Code', value: code },
                  { name: 'name', label: 'Name', value: name },
                  { name: 'description', label: 'Description', value: description, area: true },
                ]}
                act="Save the correction"
                done={`${code} is corrected`}
                onClose={close}
              />
            ),
          },
        ]}
      />
    </div>
  );
}

import { AreaField, Field, SelectField } from '@/components/ui/Field';
import type { FieldErrors } from '@/components/forms/problem';

export interface NewProduct {
  organisationId: string;
  code: string;
  name: string;
  description: string;
}

interface Props {
  value: NewProduct;
  onChange: (value: NewProduct) => void;
  clients: readonly { id: string; name: string }[];
  errors: FieldErrors;
}

/** A product that the lab does not know yet. */
export function NewProductFields({ value, onChange, clients, errors }: Props) {
  const set = (name: keyof NewProduct) => (event: { target: { value: string } }) =>
    onChange({ ...value, [name]: event.target.value });
  const said = (name: keyof NewProduct, label: string) => errors[name] && `${label} ${errors[name]}.`;
  return (
    <div className="grid gap-4">
      <SelectField
        label="Client"
        value={value.organisationId}
        onChange={set('organisationId')}
        error={errors.organisationId && 'Choose the client it belongs to.'}
        hint="Only people of this organisation will see it, and the lab."
      >
        <option value="">Choose one of {clients.length}</option>
        {clients.map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </SelectField>
      <div className="grid gap-4 pad:grid-cols-[10rem_1fr]">
        <Field
          label="Code"
          name="code"
          autoComplete="off"
          value={value.code}
          onChange={set('code')}
          hint="As in LD-40"
          error={said('code', 'Code')}
        />
        <Field
          label="Name"
          name="name"
          autoComplete="off"
          value={value.name}
          onChange={set('name')}
          hint="As in Lumen strip driver"
          error={said('name', 'Name')}
        />
      </div>
      <AreaField
        label="Description"
        name="description"
        value={value.description}
        onChange={set('description')}
        hint="Supply, leads, clocks and converters: what its emissions may come from"
        error={said('description', 'Description')}
      />
    </div>
  );
}

'use client';

import type { PersonView } from '@/schemas/people';
import { CorrectForm } from '@/app/(lab)/jobs/CorrectForm';
import { InPlace, type InPlaceAct } from '@/app/(lab)/jobs/InPlace';
import { WRITES } from '../writes';

/** What a manager does with a person: correct the name, change the role, shut them out with a reason, let them in. */
export function PersonActs({ person, own }: { person: PersonView; own: boolean }) {
  const { id, version, name, role, state } = person;
  const shared = { what: 'person', id, version };
  const rename: InPlaceAct = {
    id: 'rename',
    word: 'Correct the name',
    form: (close) => (
      <CorrectForm
        {...shared}
        operation={WRITES.changePerson}
        fields={[{ name: 'name', label: 'Name', value: name }]}
        act="Save the name"
        done={`${name} has the new name`}
        onClose={close}
      />
    ),
  };
  const other = role === 'manager' ? 'technician' : 'manager';
  const promote: InPlaceAct = {
    id: 'role',
    word: `Make ${other}`,
    form: (close) => (
      <CorrectForm
        {...shared}
        operation={WRITES.changePerson}
        fields={[]}
        fixed={{ role: other }}
        act={`Make ${name} a ${other}`}
        done={`${name} is a ${other} from the next page on`}
        onClose={close}
      />
    ),
  };
  const disable: InPlaceAct = {
    id: 'disable',
    word: 'Disable with a reason',
    form: (close) => (
      <CorrectForm
        {...shared}
        operation={WRITES.disablePerson}
        fields={[
          {
            name: 'reason',
            label: 'The reason',
            value: '',
            hint: 'They are signed out everywhere at once; what they recorded stays.',
          },
        ]}
        fixed={{}}
        act={`Disable ${name}`}
        done={`${name} is disabled`}
        onClose={close}
      />
    ),
  };
  const enable: InPlaceAct = {
    id: 'enable',
    word: 'Enable with a reason',
    form: (close) => (
      <CorrectForm
        {...shared}
        operation={WRITES.enablePerson}
        fields={[{ name: 'reason', label: 'The reason', value: '', hint: 'The password they had works again.' }]}
        fixed={{}}
        act={`Enable ${name}`}
        done={`${name} is enabled`}
        onClose={close}
      />
    ),
  };
  const acts = [
    rename,
    ...(role === 'designer' ? [] : [promote]),
    ...(state === 'disabled' ? [enable] : own ? [] : [disable]),
  ];
  return (
    <div className="mt-2">
      <InPlace acts={acts} />
    </div>
  );
}

'use client';

import Link from 'next/link';
import { Field, SelectField } from '@/components/ui/Field';
import { Switch } from '@/components/ui/Switch';
import { formatBandwidth } from '@/format/frequencies';
import { formatDistance, unitLabel } from '@/format/quantities';
import type { FinalsSheetView } from '@/schemas/finals';
import { fieldUnit, READING_KINDS, type ReadingKind, type Setting } from './typedFinals';

interface Props {
  sheet: FinalsSheetView;
  setting: Setting;
  onChange: (setting: Setting) => void;
}

/** How the finals are taken, as the run that asked for them was, with where each comes from. */
export function FinalsSetting({ sheet, setting, onChange }: Props) {
  const { paths, port } = sheet;
  const proposed = sheet.proposed!;
  const change = (part: Partial<Setting>) => onChange({ ...setting, ...part });
  const asBefore = setting.pathId === (proposed.pathId ?? '');
  const bandwidths = [...new Set(sheet.positions.flatMap(({ finals }) => finals.map(({ rbwHz }) => rbwHz)))];
  const chosen = paths.find(({ id }) => id === setting.pathId);
  const held = asBefore && setting.reading !== 'field' ? proposed.alreadyCorrected : [];
  return (
    <div className="finals-setting">
      <div className="finals-fields">
        <SelectField
          label="Signal path"
          value={setting.pathId}
          error={chosen?.wrong ? `The ${chosen.wrong}. Choose another path.` : null}
          hint={asBefore ? `As in run ${proposed.from.number}` : `Run ${proposed.from.number} used another`}
          onChange={(event) => change({ pathId: event.target.value })}
        >
          {paths.map(({ id, code, name, revision }) => (
            <option key={id} value={id}>
              {code}, {name}, revision {revision}
            </option>
          ))}
          <option value="">No path: nothing is concluded</option>
        </SelectField>
        <SelectField
          label="Readings are"
          value={setting.reading}
          onChange={(event) => change({ reading: event.target.value as ReadingKind })}
        >
          {READING_KINDS.filter(
            (kind) => kind !== 'field' || port === 'enclosure' || proposed.valuesHold === 'field',
          ).map((kind) => (
            <option key={kind} value={kind}>
              {kind === 'field'
                ? `${unitLabel(fieldUnit(proposed))}, corrected already`
                : `${unitLabel(kind)} at the receiver`}
            </option>
          ))}
        </SelectField>
        <Field
          label="Operating mode"
          value={setting.operatingMode}
          maxLength={120}
          autoComplete="off"
          error={setting.operatingMode.trim() === '' ? 'The operating mode is needed.' : null}
          onChange={(event) => change({ operatingMode: event.target.value })}
        />
        {port === 'enclosure' && (
          <Switch
            legend="Antenna height"
            shown
            choices={[
              { value: 'varied', word: 'varied' },
              { value: 'fixed', word: 'fixed' },
            ]}
            value={setting.heightSwept ? 'varied' : 'fixed'}
            hint={setting.heightSwept ? 'The maximum was held' : 'Under at one height proves nothing of the others'}
            onChange={(value) => change({ heightSwept: value === 'varied' })}
          />
        )}
      </div>
      <p className="t-detail">
        Limit set {proposed.limitSet.name}
        {proposed.distanceM !== null && `, measured at ${formatDistance(proposed.distanceM)}`}, from run{' '}
        <Link prefetch={false} href={`/sweeps/${proposed.from.id}`} className="t-id text-pen underline">
          {proposed.from.number}
        </Link>
        ; {bandwidths.map(formatBandwidth).join(' and ')} bandwidth, as the limit lines ask
        {held.length > 0 && `; ${held.join(', ')} in the reading already, as in run ${proposed.from.number}`}.
      </p>
    </div>
  );
}

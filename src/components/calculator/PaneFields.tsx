'use client';

import { Button } from '@/components/ui/Button';
import { Field, SelectField } from '@/components/ui/Field';
import { Switch } from '@/components/ui/Switch';
import type { PaneField } from './pane';
import type { Calculator } from './useCalculator';

/** In letters, with the room around each word as three: more does not fit a column of fields. */
const SWITCH_ROOM = 26;

/** The fields of a pane. Nothing is sent: Enter only keeps the browser from leaving. */
export function PaneFields({ calculator }: { calculator: Calculator }) {
  const { pane, read, entries, enter, clear } = calculator;
  const filled = read.fields.filter(({ name }) => (entries[name] ?? '') !== '').length;
  const unitsExplained = read.fields.find(({ kind }) => kind === 'frequency');
  return (
    <form
      action="/calculator"
      className="calc-form"
      aria-label={pane.title}
      onSubmit={(event) => event.preventDefault()}
    >
      <input type="hidden" name="pane" value={pane.id} />
      {groupsOf(read.fields).map(([group, fields]) => (
        <div key={group} className="calc-group" {...(group !== '' && { role: 'group', 'aria-label': group })}>
          {group !== '' && <p className="calc-group-name">{group}</p>}
          <div className="calc-fields">
            {fields.map((field) => (
              <OneField
                key={field.name}
                field={field}
                calculator={calculator}
                explains={field === unitsExplained}
                onEnter={(text) => enter(field.name, text)}
              />
            ))}
          </div>
        </div>
      ))}
      {filled > 0 && (
        <Button kind="quiet" size="table" onClick={clear}>
          {filled === 1 ? 'Clear 1 field' : `Clear ${filled} fields`}
        </Button>
      )}
    </form>
  );
}

/** The fields under their headings, in their order. */
function groupsOf(fields: readonly PaneField[]): [string, PaneField[]][] {
  const groups = new Map<string, PaneField[]>();
  for (const field of fields) groups.set(field.group ?? '', [...(groups.get(field.group ?? '') ?? []), field]);
  return [...groups];
}

interface OneProps {
  field: PaneField;
  calculator: Calculator;
  /** Says once on a pane that a frequency may carry its own unit. */
  explains: boolean;
  onEnter: (text: string) => void;
}

function OneField({ field, calculator, explains, onEnter }: OneProps) {
  const { read, outcome, entries } = calculator;
  const error = read.problems[field.name] ?? outcome.wrong?.[field.name] ?? null;
  if (field.kind === 'choice') {
    const value = read.given.choice(field.name) ?? '';
    if (field.choices.reduce((sum, { word }) => sum + word.length + 3, 0) <= SWITCH_ROOM) {
      return (
        <Switch
          legend={field.label}
          shown
          name={field.name}
          choices={field.choices}
          value={value}
          onChange={onEnter}
          hint={field.hint}
          error={error}
        />
      );
    }
    return (
      <SelectField
        label={field.label}
        name={field.name}
        value={value}
        hint={field.hint}
        error={error}
        onChange={(event) => onEnter(event.currentTarget.value)}
      >
        {field.first === undefined && <option value="">choose</option>}
        {field.choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.word}
          </option>
        ))}
      </SelectField>
    );
  }
  const text = entries[field.name] ?? '';
  const ownUnit = field.kind === 'frequency' && /[a-z]/i.test(text);
  return (
    <div className="calc-field">
      <Field
        label={field.label}
        name={field.name}
        value={text}
        onChange={(event) => onEnter(event.currentTarget.value)}
        autoComplete="off"
        maxLength={40}
        figure
        unit={ownUnit || field.unit === '' ? undefined : field.unit}
        hint={field.hint ?? (explains ? 'Or with its unit: 65 kHz, 2.4 GHz.' : undefined)}
        error={error}
      />
      {field.picks && (
        <p className="calc-picks">
          {field.picks.map((pick) => (
            <button
              key={pick}
              type="button"
              aria-label={`${field.label} ${pick} ${field.unit}`}
              onClick={() => onEnter(pick)}
            >
              {pick}
            </button>
          ))}
        </p>
      )}
    </div>
  );
}

import { renderToStaticMarkup } from 'react-dom/server';
import type { ReactElement } from 'react';
import { Button, ButtonLink } from '@/components/ui/Button';
import { CheckField } from '@/components/ui/CheckField';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { AreaField, Field, SelectField } from '@/components/ui/Field';
import { ComputedFigure, Figure, Runs } from '@/components/ui/Figure';
import { Finding } from '@/components/ui/Finding';
import { Id, IdentityLine } from '@/components/ui/IdentityLine';
import { Message } from '@/components/ui/Message';
import { Pager } from '@/components/ui/Pager';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Switch } from '@/components/ui/Switch';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';

const html = (element: ReactElement) => renderToStaticMarkup(element);
const attribute = (markup: string, tag: string, name: string) =>
  new RegExp(`<${tag}[^>]* ${name}="([^"]*)"`).exec(markup)?.[1];

describe('fields', () => {
  const markup = html(
    <Field label="Distance" unit="m" name="distanceM" hint="as the limit says" error="Limit set is for 3 m or 10 m" />,
  );
  test('the label belongs to the input and says the unit', () => {
    expect(attribute(markup, 'label', 'for')).toBe(attribute(markup, 'input', 'id'));
    expect(markup.replace(/<[^>]+>/g, '')).toContain('Distance, in m');
  });
  test('error and hint are read with the input, the error marked by a glyph as well as a colour', () => {
    const id = attribute(markup, 'input', 'id');
    expect(attribute(markup, 'input', 'aria-describedby')).toBe(`${id}-error ${id}-hint`);
    expect(attribute(markup, 'input', 'aria-invalid')).toBe('true');
    expect(markup).toMatch(/field-error[^>]*><svg/);
  });
  test('nothing is described where nothing is said', () => {
    expect(html(<Field label="Mode" name="mode" />)).not.toMatch(/aria-(describedby|invalid)/);
  });
  test.each([
    ['select', html(<SelectField label="Path" error="choose one" />)],
    ['textarea', html(<AreaField label="Note" error="too long" />)],
  ])('%s is labelled and described alike', (tag, drawn) => {
    expect(attribute(drawn, 'label', 'for')).toBe(attribute(drawn, tag, 'id'));
    expect(attribute(drawn, tag, 'aria-invalid')).toBe('true');
  });
});

describe('switch', () => {
  const choices = [
    { value: 'margin', word: 'Margin' },
    { value: 'level', word: 'Level' },
  ] as const;
  const markup = html(<Switch legend="Chart" name="chart" choices={choices} defaultValue="level" />);
  test('is a named group of radio buttons, one of them chosen', () => {
    expect(markup).toMatch(/<fieldset[^>]*><legend[^>]*>Chart<\/legend>/);
    expect(markup.match(/type="radio"/g)).toHaveLength(2);
    expect(markup.match(/name="chart"/g)).toHaveLength(2);
    expect(markup.match(/checked=""/g)).toHaveLength(1);
    expect(markup).toMatch(/value="level" *[^>]*checked|checked[^>]*value="level"/);
  });
  test('may start with nothing chosen, so that a person answers', () =>
    expect(html(<Switch legend="Values are" choices={choices} required />)).not.toContain('checked'));
});

describe('buttons', () => {
  test('a key that is shown is one that works', () => {
    const markup = html(
      <Button kind="primary" keyName="F">
        Measure 3 finals
      </Button>,
    );
    expect(attribute(markup, 'button', 'data-key')).toBe('F');
    expect(attribute(markup, 'button', 'aria-keyshortcuts')).toBe('F');
    expect(markup).toMatch(/<kbd[^>]*aria-hidden="true"[^>]*>F<\/kbd>/);
  });
  test('an unavailable one stays in the tab order, says so and has no key', () => {
    const markup = html(
      <Button kind="unavailable" keyName="A" type="submit">
        Waits for finals
      </Button>,
    );
    expect(attribute(markup, 'button', 'aria-disabled')).toBe('true');
    expect(attribute(markup, 'button', 'type')).toBe('button');
    expect(markup).not.toMatch(/ disabled|data-key/);
  });
  test('a busy one cannot submit a second time', () => {
    const markup = html(
      <Button busy type="submit">
        Keep
      </Button>,
    );
    expect(attribute(markup, 'button', 'type')).toBe('button');
    expect(attribute(markup, 'button', 'aria-busy')).toBe('true');
  });
  test('outside a form nothing is submitted by accident', () =>
    expect(attribute(html(<Button>Cancel</Button>), 'button', 'type')).toBe('button'));
  test('a link looks alike and goes somewhere', () =>
    expect(attribute(html(<ButtonLink href="/sweeps/new">Choose files</ButtonLink>), 'a', 'href')).toBe('/sweeps/new'));
});

describe('figures', () => {
  test('a computed one is a button that says what it opens', () => {
    const markup = html(
      <ComputedFigure value="37.4" quantity="level" saidUnit="dBµV/m" open={false} onOpen={() => {}} controls="w" />,
    );
    expect(attribute(markup, 'button', 'aria-label')).toBe('level 37.4 dBµV/m, show working');
    expect(attribute(markup, 'button', 'aria-expanded')).toBe('false');
    expect(attribute(markup, 'button', 'aria-controls')).toBe('w');
    expect(markup).not.toContain('data-tie');
  });
  test('open, it is where the tie line starts', () =>
    expect(
      attribute(html(<ComputedFigure value="37.4" quantity="level" open onOpen={() => {}} />), 'button', 'data-tie'),
    ).toBe('figure'));
  test('the runs of a finding keep their words and set their figures apart', () => {
    const runs = [{ text: 'Over by ' }, { text: '6.2 dB', figure: true, strong: true }, { text: '.' }];
    const markup = html(<Finding verdict="over" runs={runs} />);
    expect(markup.replace(/<[^>]+>/g, '')).toBe('Over by 6.2 dB.');
    expect(markup).toContain('<span class="t-figure font-semibold">6.2 dB</span>');
  });
});

test('a message is read out only when asked, and at once only for lost work', () => {
  expect(html(<Message tone="over">x</Message>)).not.toContain('role');
  expect(html(<Message tone="under" live="polite" />)).toContain('role="status"');
  expect(html(<Message tone="over" live="assertive" />)).toContain('role="alert"');
});

test('a table has a caption, column heads and row heads', () => {
  const markup = html(
    <Table caption="Candidates">
      <TableHead>
        <HeadCell>Item</HeadCell>
        <HeadCell figure unit="MHz">
          Frequency
        </HeadCell>
      </TableHead>
      <tbody>
        <Row chosen>
          <KeyCell>ANT-02</KeyCell>
          <Cell figure>144.018</Cell>
        </Row>
      </tbody>
    </Table>,
  );
  expect(markup).toContain('<caption class="sr-only">Candidates</caption>');
  expect(markup.match(/scope="col"/g)).toHaveLength(2);
  expect(markup).toContain('<th scope="row" class="tbl-key">ANT-02</th>');
});

test('a pager without anywhere to go is not drawn', () => {
  expect(html(<Pager firstHref={null} nextHref={null} />)).toBe('');
  expect(html(<Pager firstHref={null} nextHref="?after=x" />)).toMatch(/rel="next"/);
});

test('nothing drawn on the server carries a style attribute: the content security policy would drop it', () => {
  const all = html(
    <>
      <Field label="a" unit="m" keyName="1" error="b" tall />
      <SelectField label="a" keyName="2" />
      <AreaField label="a" />
      <CheckField label="a" hint="b" />
      <Switch legend="a" shown choices={[{ value: 'a', word: 'a' }]} full />
      <Button keyName="ArrowUp">a</Button>
      <Message tone="over" lead="a" />
      <Figure value="1" unit="m" strong />
      <Runs runs={[{ text: 'a', figure: true }]} />
      <SectionHeading remark="a">a</SectionHeading>
      <IdentityLine>
        <Id>R-07</Id>
      </IdentityLine>
      <EmptyLine lead="a">b</EmptyLine>
    </>,
  );
  expect(all).not.toMatch(/\sstyle=/);
});

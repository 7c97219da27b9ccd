import { renderToStaticMarkup } from 'react-dom/server';
import type { ReactElement } from 'react';
import { describe, expect, it } from 'vitest';
import { AppShell } from '@/app/_components/app-shell';
import { Button } from '@/app/_components/button';
import { Checkbox } from '@/app/_components/checkbox';
import { DataTable } from '@/app/_components/data-table';
import { Digest } from '@/app/_components/digest';
import { EmptyState } from '@/app/_components/empty-state';
import { ErrorState } from '@/app/_components/error-state';
import { GateLine } from '@/app/_components/gate-line';
import { Length } from '@/app/_components/length';
import { MeasureBar } from '@/app/_components/measure-bar';
import { NumberField } from '@/app/_components/number-field';
import { PreferencesProvider } from '@/app/_components/preferences-context';
import { ProgressBar } from '@/app/_components/progress-bar';
import { Select } from '@/app/_components/select';
import { StatusWord, states, type State } from '@/app/_components/status-word';
import { TextField } from '@/app/_components/text-field';
import { Time } from '@/app/_components/time';
import { TitleBlock } from '@/app/_components/title-block';

const render = (element: ReactElement) => renderToStaticMarkup(element);
const text = (html: string) => html.replace(/<[^>]*>/g, '').replace(/\s+/g, ' ');

/** Value of an attribute in the first tag that matches. */
function attribute(html: string, tag: RegExp, name: string): string | null {
  const found = html.match(new RegExp(`<${tag.source}[^>]*>`))?.[0] ?? '';
  return found.match(new RegExp(`\\s${name}="([^"]*)"`))?.[1] ?? null;
}

describe('fields', () => {
  it('tie label, help and error to the control', () => {
    const html = render(
      <TextField
        label="Number"
        help="As on the drawing."
        error="QP-014 is taken. Choose another number."
        defaultValue="QP-014"
      />,
    );
    expect(attribute(html, /label/, 'for')).toBe(attribute(html, /input/, 'id'));
    expect(attribute(html, /input/, 'aria-invalid')).toBe('true');
    const described = (attribute(html, /input/, 'aria-describedby') ?? '').split(' ');
    expect(described.length).toBeGreaterThanOrEqual(2);
    for (const id of described) expect(html).toContain(`id="${id}"`);
    expect(text(html)).toContain('QP-014 is taken');
  });

  it('say nothing of an error where there is none', () => {
    const html = render(<TextField label="Number" />);
    expect(attribute(html, /input/, 'aria-invalid')).toBeNull();
    expect(html).not.toContain('▲');
  });

  it('speak the unit with the label', () => {
    const html = render(<NumberField label="Gauge" unit="mm" value={0.8} onChange={() => {}} />);
    expect(text(html.match(/<label.*?<\/label>/)?.[0] ?? '')).toBe('Gauge in mm');
    expect(attribute(html, /input/, 'value')).toBe('0.8');
    expect(html).toMatch(/inputmode="decimal"/i);
  });

  it('name a limit that a number breaks', () => {
    const html = render(<NumberField label="Gauge" unit="mm" value={9} max={3} onChange={() => {}} />);
    expect(text(html)).toContain('At most 3 mm.');
  });

  it('show the chosen option of a select', () => {
    const html = render(
      <Select
        label="Sheet"
        defaultValue="petg"
        options={[
          { value: 'petg', label: 'PETG' },
          { value: 'ps', label: 'HIPS' },
        ]}
      />,
    );
    expect(html).toContain('aria-haspopup="listbox"');
    expect(text(html)).toContain('Sheet');
  });

  it('are real checkboxes', () => {
    const html = render(<Checkbox label="The fan is on" defaultValue error="Switch the fan on first." />);
    expect(html).toMatch(/<input[^>]*type="checkbox"/);
    expect(text(html)).toContain('Switch the fan on first.');
  });
});

describe('Button', () => {
  it('keeps its words while it works and says that it does', () => {
    const html = render(
      <Button variant="primary" isPending>
        Post
      </Button>,
    );
    expect(text(html)).toContain('Post');
    expect(html).toContain('aria-label="Working"');
    expect(html).toContain('role="progressbar"');
  });

  it('is at least 48 px high where hands are dirty', () => {
    expect(render(<Button size="roomy">Record a pull</Button>)).toContain('min-h-12');
  });
});

describe('states', () => {
  it.each(Object.keys(states) as State[])('%s has a shape and a word', (state) => {
    const html = render(<StatusWord state={state} />);
    expect(html).toMatch(/<svg aria-hidden="true"[^>]*>.+<\/svg>/);
    expect(text(html)).toBe(states[state].word);
  });

  it('that differ in colour alone do not exist', () => {
    const faces = Object.values(states).map(({ shape, word }) => `${shape} ${word}`);
    expect(new Set(faces).size).toBe(faces.length);
  });
});

describe('GateLine', () => {
  const html = render(
    <GateLine
      gates={[
        { id: 'a', name: 'Forming', state: 'passed', line: 'one finding waived' },
        {
          id: 'b',
          name: 'Studio',
          state: 'passed',
          signatures: [
            { name: 'L. Okafor', role: 'lead', at: '2026-07-03T07:40:00Z', words: 'ready for you' },
          ],
        },
        {
          id: 'c',
          name: 'Client',
          state: 'open',
          awaited: { names: ['A. Brandt', 'J. Soler'], due: '2026-07-09', have: 1, needed: 2 },
        },
        { id: 'd', name: 'Locked', state: 'ahead' },
      ]}
    />,
  );

  it('keeps the order and marks the open gate', () => {
    const items = html.match(/<li.*?<\/li>/g) ?? [];
    expect(items.map((item) => text(item).match(/^\w+/)?.[0])).toEqual([
      'Forming',
      'Studio',
      'Client',
      'Locked',
    ]);
    expect(items.filter((item) => item.includes('aria-current="step"'))).toEqual([items[2]]);
  });

  it('says who signed, when with the zone, and with what words', () => {
    expect(text(html)).toContain('L. Okafor, lead, 3 Jul 2026, 07:40 UTC “ready for you”');
  });

  it('says who is awaited', () => {
    expect(text(html)).toContain('waits for A. Brandt or J. Soler, due 9 Jul 2026, 1 of 2 signed');
  });
});

describe('TitleBlock', () => {
  it('is a list of terms and values in the order given', () => {
    const html = render(
      <TitleBlock
        fields={[
          { label: 'Number', value: 'QP-014', style: 'large' },
          { label: 'Revision', value: 'C' },
        ]}
      />,
    );
    expect(html.match(/<dt[^>]*>(.*?)<\/dt>/g)?.map(text)).toEqual(['Number', 'Revision']);
    expect(html.match(/<dd[^>]*>(.*?)<\/dd>/g)?.map(text)).toEqual(['QP-014', 'C']);
  });
});

describe('DataTable', () => {
  const columns = [
    {
      key: 'no',
      label: 'Number',
      cell: (row: { no: string }) => row.no,
      sortHref: (d: string) => `?dir=${d}`,
    },
    { key: 'rev', label: 'Revision', cell: () => 'C', align: 'end' as const },
  ];

  it('offers the other direction of the sorted column and names the present one', () => {
    const html = render(
      <DataTable
        caption="Templates"
        columns={columns}
        rows={[{ no: 'QP-014' }]}
        rowKey={(r) => r.no}
        sort={{ key: 'no', direction: 'asc' }}
      />,
    );
    expect(html).toContain('aria-sort="ascending"');
    expect(html).toContain('href="?dir=desc"');
    expect(text(html.match(/<caption.*?<\/caption>/)?.[0] ?? '')).toBe('Templates');
    expect(html).toMatch(/<th role="rowheader" scope="row"[^>]*>QP-014/);
  });

  it('shows what helps when there is nothing to list', () => {
    const html = render(
      <DataTable
        caption="Templates"
        columns={columns}
        rows={[]}
        rowKey={(r) => r.no}
        empty={<EmptyState title="No templates yet">Make the first one.</EmptyState>}
      />,
    );
    expect(html).not.toContain('<table');
    expect(text(html)).toBe('No templates yetMake the first one.');
  });
});

describe('figures', () => {
  it('follow the reader’s units', () => {
    const inUnits = (units: 'mm' | 'in') =>
      text(
        render(
          <PreferencesProvider initial={{ theme: 'system', units, zone: null }} renderedAt={0}>
            <Length mm={25.4} />
          </PreferencesProvider>,
        ),
      );
    expect(inUnits('mm')).toBe('25.40 mm');
    expect(inUnits('in')).toBe('1.000 in');
  });

  it('measure against what is wanted, in words as well', () => {
    const html = render(<MeasureBar value={0.31} limit={0.35} unit="mm" sense="at-least" />);
    expect(attribute(html, /div/, 'aria-label')).toBe('Measured 0.31 mm, wanted 0.35 mm');
    expect(html).toContain('bg-madder');
    expect(render(<MeasureBar value={0.36} limit={0.35} unit="mm" sense="at-least" />)).not.toContain(
      'bg-madder',
    );
    expect(render(<MeasureBar value={0.36} limit={0.35} unit="mm" sense="at-most" />)).toContain('bg-madder');
  });

  it('group a digest and keep all of it within reach', () => {
    const digest = '9f3ac27e41d00b7c9f3ac27e41d00b7c9f3ac27e41d00b7c9f3ac27e41d00b7c';
    const html = render(<Digest value={digest} />);
    expect(text(html)).toBe('9f3a c27e 41d0 …');
    expect(attribute(html, /code/, 'title')).toBe(digest);
  });

  it('tell progress in words', () => {
    const html = render(<ProgressBar label="tray.stl" value={0.375} />);
    expect(attribute(html, /div/, 'aria-valuetext')).toBe('37 %');
  });
});

describe('Time', () => {
  const at = '2026-07-03T07:40:00Z';
  const shown = (renderedAt: string, zone: string | null) =>
    render(
      <PreferencesProvider
        initial={{ theme: 'system', units: 'mm', zone }}
        renderedAt={Date.parse(renderedAt)}
      >
        <Time at={at} />
      </PreferencesProvider>,
    );

  it('is machine-readable and in the reader’s zone, counted from when the page was made', () => {
    const html = shown('2026-07-03T09:41:00Z', 'Europe/Lisbon');
    expect(html).toContain('dateTime="2026-07-03T07:40:00.000Z"');
    expect(text(html)).toBe('3 Jul 2026, 08:40 WEST (2 h ago)');
  });

  it('falls back to UTC until the zone is known', () => {
    expect(text(shown('2026-07-03T07:40:10Z', null))).toBe('3 Jul 2026, 07:40 UTC (just now)');
  });

  it('does not break on a date that is none', () => {
    expect(text(render(<Time at="soon" />))).toBe('no date');
  });
});

describe('ErrorState', () => {
  it('is announced, with the reference', () => {
    const html = render(
      <ErrorState title="The docket could not be loaded" reference="ref-1">
        Reload the page.
      </ErrorState>,
    );
    expect(html).toContain('role="alert"');
    expect(text(html)).toBe('The docket could not be loadedReload the page.Reference ref-1');
  });
});

describe('AppShell', () => {
  const html = render(
    <AppShell
      person={{ name: 'Lena Okafor', email: 'lena@halden.example' }}
      crumbs={[{ label: 'Templates', href: '/w/q' }, { label: 'Tart tray' }]}
      spaces={[{ id: 'q', name: 'Quillon', href: '/w/q', kind: 'workspace', current: true }]}
      nav={[{ label: 'Templates', href: '/w/q', current: true }]}
    >
      <h1>Tart tray</h1>
    </AppShell>,
  );

  it('begins with a way to the page', () => {
    expect(html.indexOf('href="#main"')).toBeLessThan(html.indexOf('<header'));
    expect(html).toMatch(/<main id="main" tabindex="-1"/i);
  });

  it('says where one is', () => {
    expect(html).toMatch(/<nav aria-label="Where you are"/);
    expect(html).toMatch(/<span aria-current="page"[^>]*>Tart tray/);
    expect(html.match(/<h1/g)).toHaveLength(1);
  });

  it('names the one who is signed in', () => {
    expect(html).toContain('aria-label="You: Lena Okafor"');
  });
});

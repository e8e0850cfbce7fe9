import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Member } from '@shared/schemas/api';
import type { UnitSystem } from '@shared/units';
import { UnitsProvider } from '@/lib/units';
import { EditorProvider, useMemberEditor } from '../model/editor';
import { ChoiceField, QuantityField } from './fields';
import { TestValuesField, splitValues } from './test-values-field';

const connection = {
  pieces: ['lower', 'upper'],
  kind: 'fasteners',
  rows: 2,
  capacity: { basis: 'ultimate', value: 900, factorOfSafety: 2.5 },
};

const member = (change: Partial<Member> = {}): Member => ({
  id: 'm1',
  projectId: 'p1',
  mark: 'B1',
  title: 'Boards',
  state: 'draft',
  revision: 'A',
  outcome: 'refused',
  utilisation: null,
  lastChange: { at: '2026-12-01T09:41:00.000Z', by: null },
  document: {
    schema: 1,
    length: 2400,
    supports: [{ id: 'A', x: 0, kind: 'fixed' }],
    materials: [{ id: 'w', E: 11000 }],
    pieces: [
      { id: 'lower', material: 'w', y: 0, z: 0, width: 235, depth: 38 },
      { id: 'upper', material: 'w', y: 0, z: 38, width: 235, depth: 38 },
    ],
    connections: [connection],
    loadCases: [{ id: 'G', action: 'permanent' }],
    rules: { zoneGrid: 100 },
  },
  result: null,
  refusal: null,
  issues: [],
  version: 1,
  saved: { at: '2026-12-01T09:41:00.000Z', by: null },
  project: { id: 'p1', number: '26-014', name: 'Ferry landing' },
  may: { edit: true },
  ...change,
});

/** The document of the newest save, as the server would receive it. */
let sent: Member['document'][];

beforeEach(() => {
  sent = [];
  vi.stubGlobal(
    'fetch',
    vi.fn((_path: string, init: RequestInit) => {
      const { document } = JSON.parse(typeof init.body === 'string' ? init.body : '{}');
      sent.push(document);
      const { result, refusal, issues, saved } = member();
      return Promise.resolve(
        Response.json({ document, result, refusal, issues, saved, version: 1 + sent.length }),
      );
    }),
  );
});
afterEach(() => {
  cleanup();
  sessionStorage.clear();
  vi.unstubAllGlobals();
});

function Form({ of, units }: { of: Member; units: UnitSystem }) {
  const editor = useMemberEditor(of);
  return (
    <UnitsProvider value={units}>
      <EditorProvider value={editor}>
        <QuantityField path="rules.zoneGrid" label="Zone grid" measure="size" />
        <QuantityField path="connections.0.rows" label="Rows" measure="number" />
        <QuantityField path="connections.0.capacity.value" label="Ultimate" measure="force" />
        <QuantityField path="connections.0.capacity.factorOfSafety" label="FS" measure="number" />
        <ChoiceField
          path="connections.0.kind"
          label="Joined by"
          choices={[
            { value: 'fasteners', label: 'Fasteners' },
            { value: 'adhesive', label: 'Adhesive' },
          ]}
        />
        <button type="button" onClick={editor.undo}>
          Undo
        </button>
      </EditorProvider>
    </UnitsProvider>
  );
}

const show = (units: UnitSystem = 'metric', change: Partial<Member> = {}) => {
  const client = new QueryClient();
  const of = member(change);
  const tree = (system: UnitSystem) => (
    <QueryClientProvider client={client}>
      <Form of={of} units={system} />
    </QueryClientProvider>
  );
  const { rerender } = render(tree(units));
  return { switchTo: (system: UnitSystem) => rerender(tree(system)) };
};

const field = (name: string): HTMLInputElement => screen.getByLabelText(name);
const note = (name: string): string => {
  const id = field(name).getAttribute('aria-describedby') ?? '';
  return document.getElementById(id)?.textContent ?? '';
};
const lastSent = () => sent.at(-1);

describe('a field for a magnitude', () => {
  it('keeps what is typed until it is left, then shows it in the person’s units and says what it was taken for', async () => {
    show();
    const user = userEvent.setup();
    await user.clear(field('Zone grid'));
    await user.type(field('Zone grid'), `7' 10 1/2"`);
    expect(field('Zone grid').value).toBe(`7' 10 1/2"`);
    expect(note('Zone grid')).toBe('= 2\u202f400.3\u00a0mm');
    await user.tab();
    expect(field('Zone grid').value).toBe('2\u202f400.3');
    expect(note('Zone grid')).toBe(`7' 10 1/2" = 2\u202f400.3\u00a0mm`);
    await waitFor(() => expect(lastSent()?.rules).toEqual({ zoneGrid: expect.closeTo(2400.3, 9) }));
  });

  it('keeps what cannot be read, in the field and in the document, and says what to do', async () => {
    show();
    const user = userEvent.setup();
    await user.clear(field('Ultimate'));
    await user.type(field('Ultimate'), 'a lot');
    await user.tab();
    expect(field('Ultimate').value).toBe('a lot');
    expect(field('Ultimate').getAttribute('aria-invalid')).toBe('true');
    expect(note('Ultimate')).toBe('“a lot” is not understood: write it like 900, 1.2 kN or 100 kg');
    await waitFor(() => expect(lastSent()?.connections).toMatchObject([{ capacity: { value: 'a lot' } }]));
  });

  it('says at the field what the schema of the server says', async () => {
    show();
    const user = userEvent.setup();
    await user.clear(field('FS'));
    await user.type(field('FS'), '0.5');
    await waitFor(() => expect(note('FS')).toBe('The factor of safety must be 1 or more'));
    await user.clear(field('Rows'));
    await user.type(field('Rows'), '2.5');
    await waitFor(() => expect(note('Rows')).toBe('The number of rows must be a whole number'));
    await user.clear(field('FS'));
    await user.type(field('FS'), '2');
    await waitFor(() => expect(note('FS')).toBe(''));
  });

  it('shows what only the calculation could find, at its field', () => {
    show('metric', {
      issues: [{ path: 'rules.zoneGrid', message: 'The zone grid is longer than the beam' }],
    });
    expect(note('Zone grid')).toBe('The zone grid is longer than the beam');
  });

  it('changes units without changing a stored value', async () => {
    const { switchTo } = show();
    switchTo('us');
    expect(field('Zone grid').value).toBe('3.93701');
    expect(field('Ultimate').value).toBe('202.328');
    const user = userEvent.setup();
    await user.click(field('Zone grid'));
    await user.tab();
    switchTo('metric');
    expect(field('Zone grid').value).toBe('100');
    expect(sent).toEqual([]);
  });

  it('leaves nothing behind where it is emptied', async () => {
    show();
    const user = userEvent.setup();
    await user.clear(field('Zone grid'));
    await waitFor(() => expect(lastSent()).toBeDefined());
    expect(lastSent()).not.toHaveProperty('rules');
  });

  it('undoes a change', async () => {
    show();
    const user = userEvent.setup();
    await user.clear(field('Rows'));
    await user.type(field('Rows'), '3');
    await waitFor(() => expect(lastSent()?.connections).toMatchObject([{ rows: 3 }]));
    await user.click(screen.getByRole('button', { name: 'Undo' }));
    expect(field('Rows').value).toBe('2');
    await waitFor(() => expect(lastSent()?.connections).toMatchObject([{ rows: 2 }]));
  });

  it('is read only for who may not edit', async () => {
    show('metric', { may: { edit: false } });
    const user = userEvent.setup();
    expect(field('Rows').readOnly).toBe(true);
    await user.type(field('Rows'), '5');
    expect(field('Rows').value).toBe('2');
    expect(screen.getByLabelText<HTMLSelectElement>('Joined by').disabled).toBe(true);
    expect(sent).toEqual([]);
  });

  it('takes up again what was not saved before a reload', async () => {
    const kept = { document: { ...member().document, rules: { zoneGrid: 150 } }, version: 1 };
    sessionStorage.setItem('seamwright-unsaved-m1', JSON.stringify(kept));
    show();
    expect(field('Zone grid').value).toBe('150');
    await waitFor(() => expect(lastSent()?.rules).toEqual({ zoneGrid: 150 }));
    await waitFor(() => expect(sessionStorage.getItem('seamwright-unsaved-m1')).toBeNull());
  });
});

describe('values of tests', () => {
  it('splits a column, a row, and what people put between', () => {
    expect(splitValues('1203\r\n1310\n\n1275.5\n')).toEqual(['1203', '1310', '1275.5']);
    expect(splitValues('1203\t1310\t1.4 kN')).toEqual(['1203', '1310', '1.4 kN']);
    expect(splitValues('1203; 1310, 1275,5')).toEqual(['1203', '1310', '1275,5']);
  });

  function Values() {
    const editor = useMemberEditor(
      member({
        document: {
          ...member().document,
          connections: [{ ...connection, capacity: { basis: 'test', factorOfSafety: 2, values: [] } }],
        },
      }),
    );
    return (
      <EditorProvider value={editor}>
        <TestValuesField path="connections.0.capacity.values" />
      </EditorProvider>
    );
  }

  it('takes a pasted column, counts it, and points at the line that is no load', async () => {
    render(
      <QueryClientProvider client={new QueryClient()}>
        <Values />
      </QueryClientProvider>,
    );
    const user = userEvent.setup();
    await user.click(field('Ultimate loads of the specimens, N'));
    await user.paste('1200\n1300\n1250\n1.4 kN\n1180');
    // (1200 + 1300 + 1250 + 1400 + 1180)/5 = 1266
    expect(note('Ultimate loads of the specimens, N')).toBe(
      '5 values, mean 1\u202f266\u00a0N, least 1\u202f180\u00a0N',
    );
    await waitFor(() =>
      expect(lastSent()?.connections).toMatchObject([
        { capacity: { values: [1200, 1300, 1250, 1400, 1180] } },
      ]),
    );
    await user.type(field('Ultimate loads of the specimens, N'), '\nbroke early');
    expect(note('Ultimate loads of the specimens, N')).toContain('Line 6, “broke early”, is no load');
    await waitFor(() =>
      expect(lastSent()?.connections).toMatchObject([{ capacity: { values: { 5: 'broke early' } } }]),
    );
  });
});

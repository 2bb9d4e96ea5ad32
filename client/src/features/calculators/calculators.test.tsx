import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import i18next from 'i18next';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import { loadWords } from '../../lib/i18n.ts';
import { renderInApp } from '../../test/render.tsx';
import type { Calculator, FieldSpec, RawValues, ResultFigure } from './calculator.ts';
import { calculatorLoaders, calculatorSlugs, wordsOfCalculator, type CalculatorSlug } from './calculators.ts';
import { CalculatorView } from './components/calculator-view.tsx';
import { evaluate } from './evaluate.ts';
import { initialValues, readAddress, writeAddress } from './inputs.ts';

// Finding fields by role and name is slow on a busy machine.
vi.setConfig({ testTimeout: 20_000 });

const calculators = new Map<CalculatorSlug, Calculator>();
beforeAll(async () => {
  await loadWords(['calculators', 'drawings']);
  for (const slug of calculatorSlugs) calculators.set(slug, (await calculatorLoaders[slug]()).default);
});

const get = (slug: CalculatorSlug): Calculator => calculators.get(slug)!;
const start = (slug: CalculatorSlug, changes: RawValues = {}) =>
  evaluate(get(slug), { ...initialValues(get(slug).fields), ...changes });
const figuresOf = (slug: CalculatorSlug, changes: RawValues = {}): ResultFigure[] =>
  start(slug, changes).result?.blocks.flatMap((block) => [...block.figures]) ?? [];
const value = (slug: CalculatorSlug, name: string, changes: RawValues = {}) =>
  figuresOf(slug, changes).find((figure) => figure.name === name)?.value;
const open = (slug: CalculatorSlug, search = '') =>
  renderInApp(<CalculatorView calculator={get(slug)} />, { path: `/calculators/${slug}${search}` });

describe('each calculator starts with a value that can be checked elsewhere', () => {
  it('trench: NEC Table 300.5, worked, 24 + 2.375 + 2 = 28.375 in', () => {
    open('trench');
    expect(
      screen.getByRole('button', { name: /^To dig, from the finished surface: 28\.375 in\./ }),
    ).toBeVisible();
    expect(screen.getByRole('img', { name: 'Section across the trench' })).toHaveAccessibleDescription(
      /dug 28\.375 in deep.*2\.375 in outside diameter under 24 in of cover/s,
    );
  });

  // Common practice, no source.
  it('opening: 8-in wall, 24-in blade, 1 in through, overcut 6.8 in; 12 LF of cross cut', () => {
    expect(value('opening', 'overcutIn')).toBeCloseTo(6.8, 1);
    expect(value('opening', 'crossCutFt')).toBe(12);
    expect(value('opening', 'pieces')).toBe(4);
  });

  // Common practice, no source.
  it('cores: 12 in, 10 in long, 98 lb', () => {
    expect(Math.round(Number(value('cores', 'coreLb')))).toBe(98);
  });

  it('joints: joint arithmetic, 120 × 80 ft, 6 in, 7 × 80 + 5 × 120 = 1,160 LF', () => {
    expect(value('joints', 'sawFt')).toBe(1_160);
    // ACI 302.1R: a 6-in slab 1.5 in deep.
    expect(value('joints', 'depthIn')).toBe(1.5);
    // Common practice: 1,160 ft at 290 ft an hour in four hours.
    expect(value('joints', 'saws')).toBe(1);
  });

  // Common practice, no source.
  it('passes: a 9-in blade by hand reaches 3¼ in, in four passes; 15,315 SFM at 6,500 rpm', () => {
    expect(value('passes', 'passes')).toBe(4);
    expect(value('passes', 'reachIn')).toBe(3.25);
    expect(Math.round(Number(value('passes', 'rimSpeedSfm')))).toBe(15_315);
  });

  it('lifting: a search-and-rescue manual, 8 × 8 ft of 6 in is 4,800 lb', () => {
    expect(value('lifting', 'weightLb')).toBe(4_800);
    // Rigging handbooks: the factor at 60° is 1.155.
    expect(value('lifting', 'factor')).toBeCloseTo(1.155, 3);
  });

  it('dust: 29 CFR 1926.1153(c)(3), handheld saw 2 h and jackhammer 2.5 h outdoors, APF 10 each', () => {
    const respirators = figuresOf('dust').filter((figure) => figure.name === 'respirator');
    expect(respirators.map((figure) => figure.value)).toEqual(['APF 10', 'APF 10']);
    expect(value('dust', 'combinedHours')).toBe(4.5);
  });

  it('noise and vibration: 29 CFR 1926.52(d)(2)(iii), the HSE ready-reckoner, a city noise exhibit', () => {
    expect(value('noise-and-vibration', 'constructionSum')).toBeCloseTo(0.9375, 12);
    expect(value('noise-and-vibration', 'points')).toBeCloseTo(150, 10);
    expect(value('noise-and-vibration', 'levelFarDba')).toBeCloseTo(86, 1);
  });

  // Common practice, no source.
  it('slurry: 612 in-ft, 0.2 in, 3 gpm, 91.8 min is 282 gal in 6 drums', () => {
    expect(Math.round(Number(value('slurry', 'slurryGal')))).toBe(282);
    expect(value('slurry', 'drums')).toBe(6);
  });

  // Common practice, no source.
  it('price: about $10 a foot with a $200 minimum, 12 ft $200 and 25 ft $250', () => {
    expect(value('price', 'total')).toBe('$200.00');
    const lines = [{ quantity: '25', unit: 'lf', rate: '10', trip: '1' }];
    expect(value('price', 'total', { lines })).toBe('$250.00');
    expect(value('price', 'holds', { lines })).toEqual({ word: 'price.sum' });
  });
});

describe('words', () => {
  const has = (key: string) => i18next.exists(key, { ns: 'calculators' });
  const optionsOf = (name: string, spec: FieldSpec): string[] => {
    if (spec.kind === 'choice' || spec.kind === 'set') {
      const group = { name: 'embedded', unit: 'priceUnit' }[name] ?? name;
      return spec.options.map((option) => `options.${group}.${option}`);
    }
    return spec.kind === 'rows'
      ? Object.entries(spec.columns).flatMap(([column, inner]) => optionsOf(column, inner))
      : [];
  };

  it.each(calculatorSlugs)('%s has one for all it shows', (slug) => {
    const calculator = get(slug);
    const words = wordsOfCalculator(slug);
    expect(calculator.name).toBe(words);
    const keys = [
      ...['title', 'short', 'lead'].map((key) => `${words}.${key}`),
      ...calculator.sections.map((section) => `${words}.sections.${section.name}`),
      ...Object.entries(calculator.fields).flatMap(([name, spec]) =>
        spec.kind === 'rows'
          ? ['one', 'add', 'takeOut', ...Object.keys(spec.columns)].map(
              (key) => `${words}.rows.${name}.${key}`,
            )
          : [`${words}.fields.${name}`],
      ),
      ...Object.entries(calculator.fields).flatMap(([name, spec]) => optionsOf(name, spec)),
      ...calculator.cautions.map((key) => `cautions.${key}`),
    ];
    for (const block of start(slug).result?.blocks ?? []) {
      if (block.name !== undefined) keys.push(`${words}.blocks.${block.name}`);
      for (const figure of block.figures) {
        keys.push(`${words}.figures.${figure.name}`);
        if (figure.isOver !== undefined) keys.push(`${words}.over.${figure.name}`);
        if (typeof figure.value === 'object') keys.push(figure.value.word);
      }
    }
    expect(keys.filter((key) => !has(key))).toEqual([]);
    const shown = calculator.sections.flatMap((section) => section.fields);
    expect(shown.toSorted()).toEqual(Object.keys(calculator.fields).toSorted());
  });
});

describe('the address', () => {
  it('follows what is typed and brings it back', async () => {
    const first = open('slurry');
    expect(first.router.state.location.search).toBe('');
    const inchFeet = screen.getByRole('textbox', { name: 'Sawing' });
    await userEvent.clear(inchFeet);
    await userEvent.type(inchFeet, '1,224');
    await waitFor(() =>
      expect(new URLSearchParams(first.router.state.location.search).get('inchFeet')).toBe('1,224'),
    );
    const { search } = first.router.state.location;
    first.unmount();
    open('slurry', search);
    expect(screen.getByRole('textbox', { name: 'Sawing' })).toHaveValue('1,224');
    // 12 × 1,224 × 0.2 cu in of kerf.
    expect(screen.getByRole('button', { name: /^Solids from the kerf: 2,938 cu in/ })).toBeVisible();
  });

  it('holds rows, those taken out too, and goes back to the first numbers', async () => {
    const first = open('dust');
    await userEvent.click(screen.getByRole('button', { name: 'Take out task 2' }));
    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Place' }), 'indoors');
    await waitFor(() => expect(first.router.state.location.search).toContain('indoors'));
    const { search } = first.router.state.location;
    expect(new URLSearchParams(search).getAll('tasks')).toEqual(['handheld_power_saw~indoors~2']);
    await userEvent.click(screen.getByRole('button', { name: 'Back to the first numbers' }));
    await waitFor(() => expect(first.router.state.location.search).toBe(''));
    expect(screen.getAllByRole('group', { name: /^Task / })).toHaveLength(2);
    first.unmount();
    open('dust', search);
    expect(screen.getAllByRole('group', { name: /^Task / })).toHaveLength(1);
    expect(screen.getByRole('button', { name: /^Respirator: APF 10/ })).toBeVisible();
  });

  it.each(calculatorSlugs)('of %s carries every field there and back', (slug) => {
    const { fields } = get(slug);
    const raw = initialValues(fields);
    const search = writeAddress(fields, raw, new URLSearchParams('other=kept'));
    expect(readAddress(fields, new URLSearchParams(search.toString()))).toEqual(raw);
    expect(search.get('other')).toBe('kept');
  });

  it('another address in the same place replaces what was typed', async () => {
    const view = open('slurry', '?inchFeet=100');
    await view.router.navigate('/calculators/slurry?inchFeet=200');
    await waitFor(() => expect(screen.getByRole('textbox', { name: 'Sawing' })).toHaveValue('200'));
  });
});

describe('bad input', () => {
  it('stands beside its field with the range, and no result is shown', async () => {
    open('opening');
    const thickness = screen.getByRole('textbox', { name: 'Thickness' });
    await userEvent.clear(thickness);
    await userEvent.type(thickness, '-8');
    expect(thickness).toBeInvalid();
    expect(thickness).toHaveAccessibleDescription('Must be over 0 and at most 600 in.');
    expect(screen.queryByRole('button', { name: /^Pieces/ })).toBeNull();
    expect(screen.getByRole('status')).toHaveTextContent('One field needs another look');
  });

  it('says everything that is wrong at once', () => {
    const { problems } = start('opening', { lengthFt: 'four', thicknessIn: '', count: '1.5' });
    expect(Object.keys(problems)).toEqual(['lengthFt', 'thicknessIn', 'count']);
  });

  it('names what no single range tells: a blade too small for the wall', () => {
    open('opening', '?bladeDiameterIn=14');
    expect(screen.getByRole('textbox', { name: 'Blade' })).toHaveAccessibleDescription(
      'Must be over 18 in to cut 8 in with 1 in through.',
    );
  });

  it('leads to the cell of a table, in the table of its own', () => {
    open('noise-and-vibration', '?vibration=5~3&vibration=900~1');
    const second = within(screen.getByRole('group', { name: 'Tool 2' }));
    expect(second.getByRole('textbox', { name: 'Vibration' })).toHaveAccessibleDescription(
      /at most 200 m\/s²/,
    );
    expect(within(screen.getByRole('group', { name: 'Noise 2' })).getByLabelText('Level')).toBeValid();
  });

  it('a choice that is none of those offered shows as none', () => {
    open('dust', '?tasks=spoon~outdoors~1');
    expect(screen.getByRole('combobox', { name: 'Tool' })).toHaveValue('');
    expect(screen.getByRole('combobox', { name: 'Tool' })).toBeInvalid();
  });

  it('a price between two hundredths of a cent is refused, not rounded', () => {
    const lines = [{ quantity: '12.005', unit: 'lf', rate: '10', trip: '1' }];
    expect(start('price', { lines }).problems).toHaveProperty('lines[0].quantity');
  });

  const nonsense = ['', 'abc', '-1', '0', 'NaN', 'Infinity', '1e308', '1e309', '100000', '0.0000001', '<b>'];
  const variants = (calculator: Calculator): RawValues[] => {
    const raw = initialValues(calculator.fields);
    return Object.entries(calculator.fields).flatMap(([name, spec]) =>
      nonsense.flatMap((text): RawValues[] => {
        if (spec.kind !== 'rows') return [{ ...raw, [name]: text }];
        const rows = spec.initial.length > 0 ? spec.initial : [{}];
        return Object.keys(spec.columns).map((column) => ({
          ...raw,
          [name]: rows.map((row) => ({ ...row, [column]: text })),
        }));
      }),
    );
  };

  it.each(calculatorSlugs)('%s: nonsense in any field is a problem of a field or a finite number', (slug) => {
    const calculator = get(slug);
    for (const raw of variants(calculator)) {
      const { result, problems, refused, values } = evaluate(calculator, raw);
      if (result === null) {
        expect(Object.keys(problems).length > 0 || refused !== null, JSON.stringify(raw)).toBe(true);
        continue;
      }
      calculator.draw?.(values as never);
      for (const figure of result.blocks.flatMap((block) => block.figures)) {
        if (typeof figure.value === 'number') expect(Number.isFinite(figure.value), figure.name).toBe(true);
      }
    }
  });
});

it('every figure with a working opens to formula and source, in words', async () => {
  open('dust');
  const [respirator] = screen.getAllByRole('button', { name: /^Respirator: APF 10/ });
  await userEvent.click(respirator!);
  const dialog = await screen.findByRole('dialog', { name: 'How it was worked out: Respirator' });
  expect(dialog).toHaveTextContent('29 CFR 1926.1153, Table 1');
  expect(dialog).not.toHaveTextContent('handheld_power_saw');
});

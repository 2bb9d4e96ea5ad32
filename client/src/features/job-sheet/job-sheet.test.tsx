import type { Conditions, CutLine } from '@kerfyard/common/scopes';
import { fireEvent, screen } from '@testing-library/react';
import i18next from 'i18next';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import { loadWords } from '../../lib/i18n.ts';
import { renderInApp } from '../../test/render.tsx';
import type { RawValues, ResultBlock } from '../calculators/calculator.ts';
import { CalculatorView } from '../calculators/components/calculator-view.tsx';
import { evaluate } from '../calculators/evaluate.ts';
import { initialValues } from '../calculators/inputs.ts';
import { jobSheet } from './job-sheet.tsx';

// Finding fields by role and name is slow on a busy machine.
vi.setConfig({ testTimeout: 20_000 });

beforeAll(() => loadWords(['calculators', 'drawings']));

const conditions: Conditions = {
  element: 'slab_on_grade',
  face: 'floor',
  indoors: true,
  floor: '',
  steel: 'mesh',
  postTension: 'proved_none',
  below: 'soil',
  enginesAllowed: false,
  overcutsAllowed: true,
  workHours: '',
  access: '',
};
const removal = { densityPcf: 150, allowancePct: 10, maxPieceLb: 1_000 };
const cuts: CutLine[] = [
  {
    id: 'a',
    mark: 'T1',
    note: '',
    cut: {
      kind: 'trench',
      lengthFt: 40,
      widthFt: 2,
      thicknessIn: 6,
      sideCuts: 2,
      endCuts: 2,
      count: 1,
      removal,
    },
  },
  { id: 'b', mark: 'C1', note: '', cut: { kind: 'core', diameterIn: 12, depthIn: 10, count: 2 } },
];

function sheet(over: Partial<Conditions> = {}, changes: RawValues = {}) {
  const calculator = jobSheet({ cuts, conditions: { ...conditions, ...over } });
  return { calculator, ...evaluate(calculator, { ...initialValues(calculator.fields), ...changes }) };
}
const headed = (blocks: readonly ResultBlock[] | undefined, first: string) =>
  blocks?.find((block) => block.heading?.[0] === first);
const figure = (block: ResultBlock | undefined, name: string) =>
  block?.figures.find((one) => one.name === name);

describe('the job sheet', () => {
  it('steps each saw down to its depth with the smallest blade that reaches', () => {
    const { result } = sheet();
    const trench = headed(result?.blocks, 'T1');
    expect(trench?.heading).toContainEqual({ word: 'options.method.flat_saw' });
    // Common practice: 0.5 + ⌈5.5 ÷ 1.25⌉ = 1 + 5 passes; walk-behind, an 18-in blade reaches 6⅝ in.
    expect(figure(trench, 'passes')?.value).toBe(6);
    expect(figure(trench, 'blade')?.value).toBe(18);
    expect(figure(trench, 'reachIn')?.value).toBe(6.625);
  });

  it('asks for control and respirator by the task hours planned', () => {
    const tasks = (hours: string): RawValues => ({
      tasks: [
        { tool: 'handheld_power_saw', place: 'outdoors', hours },
        { tool: 'jackhammer', place: 'outdoors', hours: '2.5' },
      ],
    });
    const apf = (hours: string) =>
      sheet({}, tasks(hours))
        .result?.blocks.flatMap((block) => block.figures)
        .filter((one) => one.name === 'respirator')
        .map((one) => one.value);
    // 29 CFR 1926.1153(c)(3): 2 h and 2.5 h together are over four hours.
    expect(apf('2')).toEqual(['APF 10', 'APF 10']);
    expect(apf('1.5')).toEqual([{ word: 'dust.none' }, { word: 'dust.none' }]);
  });

  it('gives a time budget for noise and vibration once their levels are typed, none before', () => {
    expect(sheet().result?.blocks.some((block) => block.name === 'shift')).toBe(false);
    const exposures = [{ tool: 'handheld_power_saw', dba: '100', mps2: '5', hours: '3' }];
    const { result } = sheet({}, { exposures });
    const budget = result?.blocks.find(
      (block) => JSON.stringify(block.heading?.[0]) === JSON.stringify({ word: 'jobSheet.budget' }),
    );
    // 29 CFR 1926.52 Table D-2: 2 h at 100 dBA.
    expect(figure(budget, 'noiseHours')).toMatchObject({ value: 2, isOver: true });
    // HSE ready-reckoner: 5 m/s² gives 50 points an hour, 100 is the action value.
    expect(figure(budget, 'vibrationHours')).toMatchObject({ value: 2, isOver: true });
    const shift = result?.blocks.find((block) => block.name === 'shift');
    expect(figure(shift, 'points')?.value).toBeCloseTo(150, 10);
  });

  it('weighs pieces and cores', () => {
    const { result } = sheet();
    // 40 × 2 ft × 6 in at 150 pcf with 10 % is 6,600 lb: seven pieces under 1,000 lb.
    const pieces = result?.blocks.find((block) => figure(block, 'pieceLb') !== undefined);
    expect(figure(pieces, 'pieces')?.value).toBe(7);
    expect(figure(pieces, 'pieceLb')?.value).toBeCloseTo(6_600 / 7, 9);
    // Rigging handbooks: two legs at 60°, load × 1.1547 ÷ 2.
    expect(figure(pieces, 'perLegLb')?.value).toBeCloseTo((6_600 / 7 / 2) * 1.1547, 1);
    // Common practice: a 12-in core 10 in long weighs 98 lb.
    const core = headed(result?.blocks, 'C1');
    expect(Math.round(Number(figure(core, 'coreLb')?.value))).toBe(98);
  });

  it('says no lift where nobody has said how the concrete comes out', () => {
    const [trench] = cuts;
    const whole = { ...trench!, cut: { ...trench!.cut, removal: undefined } } as CutLine;
    const calculator = jobSheet({ cuts: [whole], conditions });
    const { result } = evaluate(calculator, initialValues(calculator.fields));
    const figures = result?.blocks.flatMap((block) => block.figures) ?? [];
    // 40 × 2 ft × 6 in at 150 pcf.
    expect(figures.find(({ name }) => name === 'uncutLb')?.value).toBe(6_000);
    expect(figures.some(({ name }) => name === 'perLegLb')).toBe(false);
  });

  it('is loud about what this place can do to people', () => {
    expect(sheet().calculator.cautions).toContain('carbon_monoxide');
    expect(sheet().calculator.cautions).not.toContain('tendon');
    const above = sheet({ postTension: 'unknown', below: 'unknown' }).calculator.cautions;
    expect(above.slice(0, 2)).toEqual(['tendon', 'below_unknown']);
    expect(above).toContain('falling_cores');
  });

  it('has words for all it shows', () => {
    const exposures = [{ tool: 'handheld_power_saw', dba: '100', mps2: '5', hours: '3' }];
    const { calculator, result } = sheet({ postTension: 'unknown', below: 'unknown' }, { exposures });
    const keys = [
      ...calculator.cautions.map((key) => `cautions.${key}`),
      ...calculator.sections.map(({ name }) => `jobSheet.sections.${name}`),
      ...(result?.blocks ?? []).flatMap((block) => [
        ...(block.heading ?? []).flatMap((part) => (typeof part === 'string' ? [] : [part.word])),
        ...(block.name === undefined ? [] : [`jobSheet.blocks.${block.name}`]),
        ...block.figures.map(({ name }) => `jobSheet.figures.${name}`),
        ...block.figures
          .filter(({ isOver }) => isOver !== undefined)
          .map(({ name }) => `jobSheet.over.${name}`),
      ]),
    ];
    expect(keys.filter((key) => !i18next.exists(key, { ns: 'calculators' }))).toEqual([]);
  });

  it('shows a bad number beside its field, and the section again when it is mended', () => {
    const { container } = renderInApp(<CalculatorView calculator={sheet().calculator} isSheet />);
    const drawing = () => container.querySelector<HTMLElement>('svg[role="img"]');
    expect(drawing()).toHaveAccessibleName('Section through what is cut');
    expect(drawing()).toHaveAccessibleDescription(/Slab 6 in thick\. Passes to 0\.5, .*Below: soil\./s);
    const deepest = screen.getByLabelText('Deepest pass');
    fireEvent.change(deepest, { target: { value: '0' } });
    expect(deepest).toBeInvalid();
    expect(deepest).toHaveAccessibleDescription(/^Must be over 0/);
    expect(drawing()).toBeNull();
    fireEvent.change(deepest, { target: { value: '3' } });
    expect(drawing()).toBeInTheDocument();
  });
});

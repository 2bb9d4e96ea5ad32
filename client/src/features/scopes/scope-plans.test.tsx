import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { FormProvider, useForm } from 'react-hook-form';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import { loadWords } from '../../lib/i18n.ts';
import { renderInApp } from '../../test/render.tsx';
import { CutListEditor } from './components/form/cut-list-editor.tsx';
import { MethodPicker } from './components/form/method-picker.tsx';
import { useCutList } from './components/form/use-cut-list.ts';
import { readCut, type DraftCut } from './cut-lines.ts';
import { emptyScope, type ScopeFormValues } from './scope-form-values.ts';

vi.setConfig({ testTimeout: 30_000 });
// The calculators and the drawings come with the first press, on a busy machine not at once.
const slow = { timeout: 10_000 };

beforeAll(() => loadWords(['scopes', 'scope']));

const draft = (mark: string, cut: DraftCut['cut']): DraftCut => ({ id: mark, mark, note: '', cut });
const trench = draft('T1', {
  kind: 'trench',
  lengthFt: 40,
  widthFt: 2,
  thicknessIn: 6,
  sideCuts: 2,
  endCuts: 2,
  count: 1,
});
const core = draft('C1', { kind: 'core', diameterIn: 4, depthIn: 8, count: 3 });

function Picker({ lines, conditions }: { lines: readonly DraftCut[]; conditions: object }) {
  const form = useForm<ScopeFormValues>({
    defaultValues: { ...emptyScope, conditions: { ...emptyScope.conditions, ...conditions } },
  });
  return (
    <FormProvider {...form}>
      <MethodPicker lines={lines} />
    </FormProvider>
  );
}

const outside = {
  face: 'floor',
  below: 'soil',
  indoors: false,
  enginesAllowed: true,
  overcutsAllowed: true,
};

describe('the methods of a scope', () => {
  it('stand in one line, and open to the reasons of every no and the cautions of every yes', async () => {
    const user = userEvent.setup();
    renderInApp(<Picker lines={[trench]} conditions={{ ...outside, overcutsAllowed: false }} />);
    // A round blade may not turn at these corners: the chain saw alone stops in them.
    expect(screen.getByText('chain saw; 8 others do not fit')).toBeVisible();
    const opener = screen.getByRole('button', { name: 'Show the reasons' });
    expect(opener).toHaveAttribute('aria-expanded', 'false');
    await user.click(opener);
    expect(screen.getByRole('button', { name: 'Fold the reasons' })).toHaveAttribute('aria-expanded', 'true');
    const no = screen.getByRole('list', { name: 'Do not fit' });
    expect(within(no).getAllByText(/runs past the corners and overcuts are not allowed/)).toHaveLength(4);
    expect(within(no).getAllByText('Not a tool for this kind of cut.')).toHaveLength(4);
    const yes = screen.getByRole('list', { name: 'Fit' });
    expect(within(yes).getByText('Kickback: two hands, sure footing, guard down.')).toBeVisible();
  });

  it('name the cuts a reason is about, where it is not all of them', async () => {
    const user = userEvent.setup();
    renderInApp(<Picker lines={[trench, core]} conditions={{ ...outside, indoors: true }} />);
    await user.click(screen.getByRole('button', { name: 'Show the reasons' }));
    const yes = screen.getByRole('list', { name: 'Fit' });
    expect(within(yes).getAllByText('C1: Not a tool for this kind of cut.').length).toBeGreaterThan(2);
    expect(within(yes).getByText('Only C1')).toBeVisible();
    expect(within(yes).getAllByText(/T1: No engines here/).length).toBeGreaterThan(2);
  });

  it('wait for what they depend on', () => {
    renderInApp(<Picker lines={[trench]} conditions={{ ...outside, indoors: null, below: '' }} />);
    expect(screen.getByText(/the methods depend on it: .*Indoors/)).toBeVisible();
    expect(screen.queryByRole('button')).toBeNull();
  });
});

let seen: readonly DraftCut[] = [];
function Editor({ start }: { start: readonly DraftCut[] }) {
  const { lines, change } = useCutList(start);
  seen = lines;
  return <CutListEditor lines={lines} change={change} errors={new Map()} error={undefined} />;
}

describe('the plan of a trench', () => {
  it('starts from the cut, opens its working, says who governs, and is written back with one press', async () => {
    const user = userEvent.setup();
    renderInApp(<Editor start={[trench]} />);
    const opener = screen.getByRole('button', { name: 'Plan cut T1' });
    await user.click(opener);
    const dialog = await screen.findByRole('dialog', { name: 'Plan of trench T1' }, slow);
    expect(within(dialog).getByLabelText('Length')).toHaveValue('40');
    const width = within(dialog).getByLabelText('Width');
    expect(width).toHaveValue('24');
    // NEC Table 300.5, worked: 24 of cover, 2.375 of conduit, 2 of bedding.
    const dig = within(dialog).getByRole('button', {
      name: /^To dig, from the finished surface: 28\.375 in/,
    });
    expect(within(dialog).getByRole('img', { name: 'Section across the trench' })).toBeVisible();
    expect(
      within(dialog).getByText(/authority having jurisdiction govern\.$/, { selector: 'li' }),
    ).toBeVisible();
    expect(within(dialog).getByText(/never type A/, { selector: 'li' })).toBeVisible();
    await user.click(dig);
    const working = await screen.findByRole('dialog', { name: /To dig/ }, slow);
    expect(within(working).getByText(/max\(cover, slab\) \+ conduit \+ bedding/)).toBeVisible();
    await user.keyboard('{Escape}');
    await waitFor(() => expect(screen.queryByRole('dialog', { name: /To dig/ })).toBeNull());
    await user.clear(width);
    await user.type(width, '18');
    await user.click(within(dialog).getByRole('button', { name: 'Write into cut T1' }));
    expect(seen[0]?.cut).toMatchObject({ lengthFt: 40, widthFt: 1.5, thicknessIn: 6, endCuts: 2 });
    expect(screen.queryByRole('dialog')).toBeNull();
    await waitFor(() => expect(opener).toHaveFocus());
    expect(screen.getByLabelText('Width')).toHaveValue('1.5');
  });

  it('becomes a cut of its own from the head of the list, without any number nobody typed', async () => {
    const user = userEvent.setup();
    renderInApp(<Editor start={[]} />);
    await user.click(screen.getByRole('button', { name: 'Plan a trench' }));
    const dialog = await screen.findByRole('dialog', { name: 'Plan a trench' }, slow);
    const add = within(dialog).getByRole('button', { name: 'Add it to the cut list' });
    expect(add).toBeDisabled();
    expect(within(dialog).getByLabelText('Length')).toBeValid();
    await user.type(within(dialog).getByLabelText('Length'), '30');
    await user.type(within(dialog).getByLabelText('Width'), '12');
    await user.type(within(dialog).getByLabelText('Slab'), '5');
    await waitFor(() => expect(add).toBeEnabled());
    await user.click(add);
    expect(seen[0]).toMatchObject({
      mark: 'T1',
      cut: { lengthFt: 30, widthFt: 1, thicknessIn: 5, count: 1 },
    });
    await waitFor(() => expect(screen.getByLabelText('Length')).toHaveFocus());
  });
});

describe('the plan of joints', () => {
  it('takes column bays and the saws of the window, and the cut keeps what was planned', async () => {
    const user = userEvent.setup();
    const joints = draft('J1', {
      kind: 'joints',
      lengthFt: 60,
      widthFt: 40,
      thicknessIn: 6,
      spacingFactor: 30,
      capFt: 15,
      count: 1,
    });
    renderInApp(<Editor start={[joints]} />);
    await user.click(screen.getByRole('button', { name: 'Plan cut J1' }));
    const dialog = await screen.findByRole('dialog', { name: 'Plan of joints J1' }, slow);
    await user.type(within(dialog).getByLabelText(/^Bays along the length/), '25, 35');
    // Every bay line is a joint: 4 × 40 ft and 2 × 60 ft.
    expect(await within(dialog).findByRole('button', { name: /^Joints to saw: 280 LF/ })).toBeVisible();
    expect(within(dialog).getByRole('img')).toBeVisible();
    const pace = within(dialog).getByLabelText('Pace of one saw');
    await user.clear(pace);
    await user.type(pace, '50');
    const saws = await within(dialog).findByRole('button', { name: /^Saws needed: 2/ });
    await user.click(saws);
    expect(await screen.findByRole('dialog', { name: /Saws needed/ }, slow)).toBeVisible();
    await user.keyboard('{Escape}');
    await user.click(within(dialog).getByRole('button', { name: 'Write into cut J1' }));
    expect(seen[0]?.cut).toMatchObject({ baysAlongLengthFt: [25, 35], baysAlongWidthFt: null });
    const reading = seen[0] === undefined ? null : readCut(seen[0]);
    expect(reading?.state === 'whole' && reading.takeoff.sawFt).toBe(280);
    // Another length no longer is the bays: said beside the bays, which open by themselves.
    await user.type(screen.getByLabelText('Length'), '{Backspace}5');
    const bays = await screen.findByLabelText('Bays along the length');
    expect(bays).toBeInvalid();
    expect(bays).toHaveAccessibleDescription(/add up to 65 ft/);
    await user.type(bays, '{Backspace}{Backspace}40');
    expect(bays).toBeValid();
    expect(seen[0]?.cut.baysAlongLengthFt).toEqual([25, 40]);
  });
});

describe('the corners of an opening', () => {
  it('show core-inches and the overcut from the side, both opening to their working', async () => {
    const user = userEvent.setup();
    const opening = draft('O1', {
      kind: 'opening',
      lengthFt: 4,
      widthFt: 8,
      thicknessIn: 8,
      corners: 'overcut',
      bladeDiameterIn: 24,
      passThroughIn: 1,
      count: 1,
    });
    renderInApp(<Editor start={[opening]} />);
    await user.click(screen.getByRole('button', { name: 'Details of cut O1' }));
    const corners = screen.getByRole('group', { name: 'Corners' });
    expect(within(corners).getByText('4 cores of 13.6 in')).toBeVisible();
    expect(within(corners).getByText('32 core-in')).toBeVisible();
    const picture = await within(corners).findByRole('img', { name: /seen from the side/ }, slow);
    expect(picture).toHaveAccessibleDescription(/runs 6\.8\d? in past it/);
    await user.click(
      within(corners).getByRole('button', { name: /^Run past, or left to finish square: 4\.5 ft/ }),
    );
    expect(await screen.findByText(/overcut × cut ends × count ÷ 12/, {}, slow)).toBeVisible();
  });
});

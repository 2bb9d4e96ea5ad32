import { describe, expect, it } from 'vitest';
import {
  cornerChoices,
  cornerCoreDiameterIn,
  crewHours,
  earliestDigDate,
  explain,
  overcutIn,
} from './index.ts';

describe('earliestDigDate', () => {
  it('skips the weekend and holidays', () => {
    // Thursday 24 December 2026; Friday is a holiday, so Monday and Tuesday are the two days.
    expect(earliestDigDate({ notifiedOn: '2026-12-24', fullBusinessDays: 2, holidays: ['2026-12-25'] })).toBe(
      '2026-12-30',
    );
  });

  it('a notice on Saturday counts from Monday', () => {
    expect(earliestDigDate({ notifiedOn: '2026-12-05', fullBusinessDays: 2, holidays: [] })).toBe(
      '2026-12-09',
    );
  });

  it('passes the change of clocks and the end of the year', () => {
    expect(earliestDigDate({ notifiedOn: '2026-10-30', fullBusinessDays: 1, holidays: [] })).toBe(
      '2026-11-03',
    );
    expect(earliestDigDate({ notifiedOn: '2026-12-30', fullBusinessDays: 2, holidays: ['2027-01-01'] })).toBe(
      '2027-01-05',
    );
  });

  it('never comes earlier for more days or more holidays', () => {
    const on = (fullBusinessDays: number, holidays: readonly string[]) =>
      earliestDigDate({ notifiedOn: '2026-11-24', fullBusinessDays, holidays });
    expect(on(3, []) >= on(2, [])).toBe(true);
    expect(on(2, ['2026-11-26']) >= on(2, [])).toBe(true);
  });
});

it('crewHours is the sum of its shares and shows each', () => {
  const day = crewHours({
    travelHours: 1.5,
    orientationHours: 0.5,
    setUpHours: 0.75,
    sawingHours: 3,
    moveHours: 0.25,
    breakingHours: 1,
    loadingHours: 0.5,
    cleaningHours: 0.5,
  });
  expect(day.hours).toBe(8);
  expect(day.working[0]?.inputs.map(({ value }) => value)).toEqual([1.5, 0.5, 0.75, 3, 0.25, 1, 0.5, 0.5]);
});

describe('corners side by side', () => {
  const overcut = overcutIn({ bladeDiameterIn: 24, thicknessIn: 8, passThroughIn: 1 });

  it('the same run-past is overcut, swallowed by cores, or finished square', () => {
    const { choices, cutEnds } = cornerChoices({
      bladeDiameterIn: 24,
      thicknessIn: 8,
      passThroughIn: 1,
      uncutSides: ['bottom'],
      count: 3,
    });
    const runPastFt = (4 * 3 * overcut) / 12;
    expect(cutEnds).toBe(4);
    expect(choices.map(({ corners }) => corners)).toEqual(['overcut', 'cored', 'square']);
    expect(choices[0]).toMatchObject({ overcutFt: runPastFt, coreHoles: 0, squareFinishFt: 0 });
    expect(choices[1]).toMatchObject({
      overcutFt: 0,
      coreHoles: 6,
      coreInches: 48,
      coreDiameterIn: cornerCoreDiameterIn({ overcutIn: overcut }),
    });
    expect(choices[2]).toMatchObject({ overcutFt: 0, coreHoles: 0, squareFinishFt: runPastFt });
  });

  it('a core centred on the corner is half as wide as one inside', () => {
    expect(cornerCoreDiameterIn({ overcutIn: overcut, placement: 'centred' })).toBe(overcut);
    expect(cornerCoreDiameterIn({ overcutIn: overcut, placement: 'inside' })).toBe(2 * overcut);
  });
});

describe('explain', () => {
  const steps = [
    [explain.inchFeet({ lengthFt: 10, depthIn: 6 }), 60],
    [explain.overcutIn({ bladeDiameterIn: 24, thicknessIn: 8, passThroughIn: 1 }), 6.82],
    [explain.cornerCoreDiameterIn({ overcutIn: 3 }), 6],
    [explain.coreWeightLb({ diameterIn: 12, lengthIn: 10 }), 98.17],
    [explain.slabWeightLb({ lengthFt: 8, widthFt: 8, thicknessIn: 6 }), 4_800],
    [explain.bladeReachIn({ diameterIn: 14, mount: 'hand' }), 5],
    [explain.surfaceSpeedSfm({ diameterIn: 9, rpm: 4_032 }), 9_500.18],
    [explain.rpmForSurfaceSpeed({ diameterIn: 14, sfm: 9_500 }), 2_591.95],
    [explain.levelAtDistanceDba({ levelDba: 92, referenceFt: 50, distanceFt: 100 }), 85.98],
    [explain.minimumCoverIn({ location: 'general', wiring: 'nonmetallic' }), 18],
    [explain.conduitOutsideDiameterIn({ kind: 'emt', tradeSize: '2' }), 2.197],
    [explain.sawsForWindow({ sawFt: 1_160, feetPerHour: 200, windowHours: 4 }), 2],
    [explain.lipTreatment({ heightIn: 1 }), 12],
    [explain.batteryPacks({ units: 45, unitsPerPack: 30 }), 2],
    [explain.batteryPacks({ inchFeet: 60, inchFeetPerPack: 25 }), 3],
    [explain.generatorKw({ volts: 480, amps: 30, phases: 3 }), 31.18],
  ] as const;

  it.each(steps)('shows $label with its formula, inputs and source', (step, expected) => {
    expect(step.value).toBeCloseTo(expected, 2);
    expect(step.formula).not.toBe('');
    expect(step.inputs.length).toBeGreaterThan(0);
    expect(step.source.origin).not.toBe('');
  });

  it('shows a date too', () => {
    const dig = explain.earliestDigDate({ notifiedOn: '2026-12-02', fullBusinessDays: 2, holidays: [] });
    expect(dig.value).toBe('2026-12-05');
    expect(dig.inputs).toHaveLength(2);
  });

  it('names the document of a table, and throws what its function throws', () => {
    expect(explain.minimumCoverIn({ location: 'general', wiring: 'nonmetallic' }).source).toMatchObject({
      origin: 'published',
      section: 'Table 300.5; 300.5(A) from 2023',
    });
    expect(
      explain.slabWeightLb({ lengthFt: 1, widthFt: 1, thicknessIn: 1, densityPcf: 140 }).source.origin,
    ).toBe('arithmetic');
    expect(() => explain.inchFeet(undefined as never)).toThrow(expect.objectContaining({ field: 'input' }));
  });
});

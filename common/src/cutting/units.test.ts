import fc from 'fast-check';
import Qty from 'js-quantities';
import { describe, expect, it } from 'vitest';
import {
  coreWeightLb,
  generatorKw,
  slabWeightLb,
  slurry,
  spoil,
  surfaceSpeedSfm,
  takeoffCut,
  trenchPlan,
} from './index.ts';

// The same quantities through a general-purpose units library, which does every conversion itself.

const size = fc.double({ min: 0.1, max: 500, noNaN: true });

function near(actual: number, expected: number): void {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(expected)));
}

const ft = (value: number) => Qty(value, 'ft');
const inch = (value: number) => Qty(value, 'in');
const inUnit = (quantity: Qty, unit: string) => quantity.to(unit).scalar;

describe('conversions', () => {
  it('slab weight: ft × ft × in × lb/ft³ in pounds', () => {
    fc.assert(
      fc.property(size, size, size, size, (lengthFt, widthFt, thicknessIn, densityPcf) => {
        const weight = ft(lengthFt).mul(ft(widthFt)).mul(inch(thicknessIn)).mul(Qty(densityPcf, 'lb/ft^3'));
        near(slabWeightLb({ lengthFt, widthFt, thicknessIn, densityPcf }), inUnit(weight, 'lb'));
      }),
    );
  });

  it('core weight: in² × in × lb/ft³ in pounds', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.5, max: 100, noNaN: true }), size, (diameterIn, lengthIn) => {
        const area = inch(diameterIn)
          .mul(inch(diameterIn))
          .mul(Math.PI / 4);
        const weight = area.mul(inch(lengthIn)).mul(Qty(150, 'lb/ft^3'));
        near(coreWeightLb({ diameterIn, lengthIn }), inUnit(weight, 'lb'));
      }),
    );
  });

  it('sawn face and volume of a chase and a line', () => {
    fc.assert(
      fc.property(size, fc.double({ min: 0.1, max: 20, noNaN: true }), (lengthFt, depthIn) => {
        const chase = takeoffCut({ kind: 'chase', lengthFt, widthIn: depthIn, depthIn, count: 1 });
        near(chase.removedCuFt, inUnit(ft(lengthFt).mul(inch(depthIn)).mul(inch(depthIn)), 'ft^3'));
        const line = takeoffCut({ kind: 'line', lengthFt, depthIn, count: 1 });
        near(line.sawSqFt, inUnit(ft(lengthFt).mul(inch(depthIn)), 'ft^2'));
      }),
    );
  });

  it('bars: in² in square feet', () => {
    const face = inch(0.625)
      .mul(inch(0.625))
      .mul(Math.PI / 4);
    near(takeoffCut({ kind: 'bar', diameterIn: 0.625, count: 1 }).sawSqFt, inUnit(face, 'ft^2'));
  });

  it('rim speed: in × turns a minute in feet a minute', () => {
    fc.assert(
      fc.property(fc.double({ min: 1, max: 100, noNaN: true }), size, (diameterIn, rpm) => {
        const speed = inch(diameterIn)
          .mul(Math.PI * rpm)
          .div(Qty('1 min'));
        near(surfaceSpeedSfm({ diameterIn, rpm }), inUnit(speed, 'ft/min'));
      }),
    );
  });

  it('slurry: in-ft × in in cubic inches and gallons', () => {
    fc.assert(
      fc.property(size, (inchFeet) => {
        const kerfIn = 0.2;
        const solids = ft(inchFeet).mul(inch(1)).mul(inch(kerfIn));
        const dry = slurry({ inchFeet, kerfIn, gallonsPerMinute: 0, minutes: 0 });
        near(dry.solidsCuIn, inUnit(solids, 'in^3'));
        // The library's gallon is 231 cu in to its own last printed digit.
        expect(dry.slurryGal / inUnit(solids, 'gal')).toBeCloseTo(1, 6);
        near(dry.weightLb, inUnit(solids.mul(Qty(150, 'lb/ft^3')), 'lb'));
      }),
    );
  });

  it('spoil: cubic feet in cubic yards and short tons', () => {
    fc.assert(
      fc.property(size, (cuFt) => {
        const job = spoil({ cuFt });
        near(job.bankCuYd, inUnit(Qty(cuFt, 'ft^3'), 'yd^3'));
        near(job.tons, inUnit(Qty(cuFt * 150, 'lb'), 'short-ton'));
      }),
    );
  });

  it('a trench: ft × in × in in cubic feet and yards', () => {
    fc.assert(
      fc.property(size, fc.double({ min: 1, max: 60, noNaN: true }), (lengthFt, widthIn) => {
        const plan = trenchPlan({
          lengthFt,
          widthIn,
          slabThicknessIn: 5,
          location: 'general',
          wiring: 'nonmetallic',
          conduitKind: 'pvc',
          tradeSize: '1',
          beddingIn: 0,
          swellPct: 0,
        });
        const plain = ft(lengthFt).mul(inch(widthIn));
        near(plan.concreteCuFt, inUnit(plain.mul(inch(5)), 'ft^3'));
        near(plan.soilBankCuYd, inUnit(plain.mul(inch(18 + 1.315 - 5)), 'yd^3'));
      }),
    );
  });

  it('power: volts × amperes in kilowatts', () => {
    near(
      generatorKw({ volts: 240, amps: 50, phases: 1, loadFraction: 1 }),
      inUnit(Qty('240 V').mul(Qty('50 A')), 'kW'),
    );
  });
});

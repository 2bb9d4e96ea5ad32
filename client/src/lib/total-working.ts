import type { CutListTakeoff, CutQuantities, WorkingStep } from '@kerfyard/common/cutting';

/** Labels of the engine's own steps that lead to a total; the last one named holds the cut's share of it. */
const stepLabels: Partial<Record<keyof CutQuantities, readonly RegExp[]>> = {
  sawFt: [/^saw feet/i],
  inchFeet: [/^saw feet/i, /^inch-feet/i],
};

/**
 * The working of a total over a cut list: for each cut the engine's steps, named by the cut's number, then the sum.
 * @param quantity which total of the list
 * @param unit the total's unit, shown beside it
 */
export function totalWorking(
  takeoff: CutListTakeoff,
  quantity: keyof CutQuantities,
  { label, unit }: { label: string; unit: string },
): WorkingStep[] {
  const wanted = stepLabels[quantity];
  const steps = takeoff.cuts.flatMap((cut, index) =>
    cut[quantity] === 0
      ? []
      : cut.working
          .filter((step) => wanted === undefined || wanted.some((name) => name.test(step.label)))
          .map((step) => ({ ...step, label: `${index + 1}. ${step.label}` })),
  );
  const shares = takeoff.cuts.flatMap((cut, index) =>
    cut[quantity] === 0 ? [] : [{ name: `${index + 1}.`, value: cut[quantity], unit }],
  );
  if (shares.length < 2) return steps;
  return [
    ...steps,
    {
      label,
      formula: shares.map((share) => share.name).join(' + '),
      inputs: shares,
      value: takeoff.totals[quantity],
      unit,
      source: { origin: 'arithmetic' },
    },
  ];
}

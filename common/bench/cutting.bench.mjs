// Times the cutting engine as other programs get it, so the package must be built first. The default export is for
// `npm run bench`; run by itself (node common/bench/cutting.bench.mjs) it prints the table and one line of JSON.
import { cpus } from 'node:os';
import { pathToFileURL } from 'node:url';
import { cutSketch, jointPlan, piecePlan, takeoffCutList } from '@kerfyard/common/cutting';

const removal = { densityPcf: 150, allowancePct: 10, maxPieceLb: 1_000, maxSideFt: 6 };

/** One of each common kind, dimensions moving with the index so that nothing repeats. */
function listedCut(index) {
  const lengthFt = 3 + (index % 37) * 0.75;
  const widthFt = 2 + (index % 11) * 0.5;
  const count = 1 + (index % 4);
  switch (index % 6) {
    case 0:
      return { kind: 'line', lengthFt, depthIn: 6, count };
    case 1:
      return {
        kind: 'trench',
        lengthFt,
        widthFt,
        thicknessIn: 6,
        endCuts: 2,
        bladeDiameterIn: 20,
        passThroughIn: 1,
        count,
        removal,
      };
    case 2:
      return {
        kind: 'opening',
        lengthFt,
        widthFt,
        thicknessIn: 8,
        corners: 'overcut',
        bladeDiameterIn: 24,
        passThroughIn: 1,
        count,
        removal,
      };
    case 3:
      return { kind: 'core', diameterIn: 2 + (index % 8), depthIn: 8, count };
    case 4:
      return {
        kind: 'stitch',
        lengthIn: 60 + (index % 90),
        bitDiameterIn: 4,
        overlapIn: 0.5,
        closed: true,
        depthIn: 12,
        count,
      };
    default:
      return {
        kind: 'joints',
        lengthFt: 40 + (index % 50),
        widthFt: 40,
        thicknessIn: 6,
        spacingFactor: 30,
        capFt: 15,
        count,
      };
  }
}

const cuts = Array.from({ length: 5_000 }, (_, index) => listedCut(index));
const bays = Array.from({ length: 12 }, (_, bay) => 25 + (bay % 5));
const sum = (numbers) => numbers.reduce((total, number) => total + number, 0);

const subjects = [
  {
    name: 'takeoffCutList, 5,000 cuts',
    limitMs: 50,
    run: () => takeoffCutList({ cuts }),
  },
  {
    name: 'takeoffCutList, 500 cuts',
    run: () => takeoffCutList({ cuts: cuts.slice(0, 500) }),
  },
  {
    name: 'piecePlan, 60 × 40 ft × 6 in into 80-lb pieces',
    limitMs: 1,
    run: () => piecePlan({ lengthFt: 60, widthFt: 40, thicknessIn: 6, maxPieceLb: 80 }),
  },
  {
    name: 'jointPlan, 12 × 12 unequal bays',
    run: () =>
      jointPlan({
        lengthFt: sum(bays),
        widthFt: sum(bays),
        thicknessIn: 6,
        baysAlongLengthFt: bays,
        baysAlongWidthFt: bays,
      }),
  },
  {
    name: 'cutSketch, 60 of 500 cuts',
    run: () => cutSketch(cuts.slice(0, 500)),
  },
];

const rounds = 40;

function time(run) {
  for (let warmUp = 0; warmUp < 5; warmUp += 1) run();
  const times = Array.from({ length: rounds }, () => {
    const started = performance.now();
    run();
    return performance.now() - started;
  }).sort((left, right) => left - right);
  const rounded = (ms) => Math.round(ms * 1_000) / 1_000;
  return {
    minMs: rounded(times[0]),
    medianMs: rounded(times[Math.floor(rounds / 2)]),
    maxMs: rounded(times[rounds - 1]),
  };
}

/** Min, median and max of 40 rounds after 5 to warm up, in milliseconds. */
export default async function benchCutting() {
  const rows = subjects.map(({ name, limitMs, run }) => {
    const { minMs, medianMs, maxMs } = time(run);
    return { name, minMs, medianMs, maxMs, limitMs: limitMs ?? null };
  });
  return { title: 'Cutting engine', rows };
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  const result = await benchCutting();
  console.log(result.title);
  console.table(result.rows);
  console.log(JSON.stringify({ node: process.version, cpu: cpus()[0]?.model, rounds, ...result }));
}

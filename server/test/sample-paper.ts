import { bidInputSchema } from '@kerfyard/common/bids';
import { prefillResponsibilities, scopeBodySchema } from '@kerfyard/common/scopes';
import { scheduleOfValues } from '../src/awards/schedule-of-values.ts';
import type { PaperInput } from '../src/subcontracts/paper/paper-input.ts';

const id = (n: number): string => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`;

const body = scopeBodySchema.parse({
  title: 'Lab wing, level 2: new risers and door openings',
  summary: 'Risers and doors for the lab wing. The floor below stays open; all work at night.',
  site: {
    name: 'Alder Creek Hospital',
    address: '1200 Millrace Road',
    city: 'Dayton',
    state: 'OH',
    zip: '45402',
    lat: 39.76,
    lon: -84.19,
    timeZone: 'America/New_York',
    contact: 'Rosa Quintero, site office at dock 3',
  },
  cuts: [
    {
      id: id(1),
      mark: 'O1',
      note: 'Door to the cold room',
      cut: {
        kind: 'opening',
        lengthFt: 4,
        widthFt: 8,
        thicknessIn: 8,
        uncutSides: ['bottom'],
        corners: 'overcut',
        bladeDiameterIn: 24,
        passThroughIn: 1,
        count: 2,
        removal: { densityPcf: 150, allowancePct: 10, maxPieceLb: 1000 },
      },
    },
    { id: id(2), mark: 'C1', note: '', cut: { kind: 'core', diameterIn: 6, depthIn: 10, count: 14 } },
    {
      id: id(3),
      mark: 'T1',
      note: 'Under the new drains',
      cut: { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, endCuts: 2, count: 1 },
    },
    { id: id(4), mark: 'L1', note: '', cut: { kind: 'line', lengthFt: 62.5, depthIn: 3, count: 1 } },
  ],
  conditions: {
    element: 'suspended_slab',
    face: 'floor',
    indoors: true,
    floor: 'Level 2',
    steel: 'heavy_bar',
    postTension: 'unknown',
    below: 'occupied',
    enginesAllowed: false,
    overcutsAllowed: true,
    workHours: '7 pm to 5 am',
    access: 'Service lift to 3,000 lb; badge at dock 3',
  },
  responsibilities: prefillResponsibilities({
    kinds: ['opening', 'core', 'trench', 'line'],
    indoors: true,
    face: 'floor',
    below: 'occupied',
  }),
  terms: {
    priceForm: 'either',
    retainageBasisPoints: 0,
    standbyFreeMinutes: 30,
    answerDays: 5,
    bidValidDays: 30,
    workFrom: '2027-01-11',
    workTo: '2027-02-12',
    wages: 'prevailing',
    notes: 'Infection-control barriers stay closed during all cutting.',
  },
  bidding: { mode: 'sealed', dueAt: '2026-12-10T22:00:00.000Z' },
});

const bid = bidInputSchema.parse({
  revision: 1,
  price: { form: 'lump', lumpCents: 1_428_000 },
  answers: [
    { item: 'cut', answer: 'included' },
    { item: 'slurry', answer: 'included' },
    { item: 'dust_containment', answer: 'excluded' },
  ],
  inclusions: ['Two night shifts', 'Vacuum pick-up of all slurry'],
  exclusions: ['Hauling and tip fees', 'Scanning beyond the marked cuts'],
  note: 'Price holds for both doors in one mobilization.',
  validDays: 30,
  startFrom: '2027-01-13',
});

/** An invented subcontract that shows every part of the paper; for tests and for looking at it. */
export function samplePaper(change: Partial<PaperInput> = {}): PaperInput {
  return {
    number: 'S-1007',
    scopeNumber: 'K-1042',
    revision: 1,
    awardedAt: new Date('2026-12-11T15:20:00.000Z'),
    signBy: new Date('2026-12-19T04:59:59.999Z'),
    gc: { name: 'Hollis & Birch Builders', phone: '(937) 555-0140' },
    crew: { name: 'Stonewake Cutting', phone: '(937) 555-0188' },
    body,
    bid,
    files: [
      {
        kind: 'drawing',
        name: 'S-201 level 2 slab.pdf',
        caption: 'Risers at grid C to F',
        pages: 2,
        sha256: '3b1f0c9a7e5d4f2688aa10d9c3e7b5f4a2918d7c6e5f40312b1a0f9e8d7c6b5a',
      },
      {
        kind: 'photo',
        name: 'corridor north.jpg',
        caption: '',
        pages: null,
        sha256: 'f00dfeed7e5d4f2688aa10d9c3e7b5f4a2918d7c6e5f40312b1a0f9e8d7c6b5a',
      },
    ],
    sov: scheduleOfValues(body.cuts, { totalCents: 1_428_000, lines: [], mobilizationCents: 0 }),
    totalCents: 1_428_000,
    ...change,
  };
}

import { randomUUID } from 'node:crypto';
import { usualUnit, type BidInput, type BidPricePreview } from '@kerfyard/common/bids';
import { cutKinds, type CutInput, type CutKind, type ScopeDetailView } from '@kerfyard/common/scopes';
import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { award } from './builders/awards.ts';
import {
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
} from './builders/people.ts';
import {
  comeDue,
  completeDraft,
  cutLine,
  linesBid,
  lumpBid,
  makeDraft,
  placeBid,
  publishScope,
} from './builders/scopes.ts';
import { closeDatabase } from './database.ts';

/** One of each kind, with what it comes to in the unit it is usually sold by, in hundredths. */
const oneOfEach: Record<CutKind, { cut: CutInput; quantity: number }> = {
  line: { cut: { kind: 'line', lengthFt: 10, depthIn: 6, count: 1 }, quantity: 6_000 },
  trench: { cut: { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, count: 1 }, quantity: 50_400 },
  opening: {
    cut: { kind: 'opening', lengthFt: 4, widthFt: 4, thicknessIn: 6, corners: 'square', count: 1 },
    quantity: 9_600,
  },
  core: { cut: { kind: 'core', diameterIn: 4, depthIn: 8, count: 6 }, quantity: 600 },
  // ⌈384 ÷ (3.25 − 0.13)⌉ = 123 holes of 13 in.
  stitch: {
    cut: {
      kind: 'stitch',
      lengthIn: 384,
      bitDiameterIn: 3.25,
      overlapIn: 0.13,
      closed: true,
      depthIn: 13,
      count: 1,
    },
    quantity: 159_900,
  },
  // 60 × 40 ft, 4 in, factor 36 → 340 ft.
  joints: {
    cut: { kind: 'joints', lengthFt: 60, widthFt: 40, thicknessIn: 4, spacingFactor: 36, count: 1 },
    quantity: 34_000,
  },
  wire: {
    cut: { kind: 'wire', areaSqFt: 50, pilotCores: 2, pilotDiameterIn: 2, depthIn: 24, count: 1 },
    quantity: 5_000,
  },
  curb: { cut: { kind: 'curb', lengthFt: 30, heightIn: 6, count: 1 }, quantity: 3_000 },
  chase: { cut: { kind: 'chase', lengthFt: 20, widthIn: 1, depthIn: 2, count: 1 }, quantity: 4_000 },
  block: { cut: { kind: 'block', cutLengthIn: 16, depthIn: 8, count: 12 }, quantity: 1_200 },
  pipe: { cut: { kind: 'pipe', outsideDiameterIn: 8, count: 2 }, quantity: 200 },
  bar: { cut: { kind: 'bar', diameterIn: 0.625, count: 24 }, quantity: 2_400 },
  lip: { cut: { kind: 'lip', widthFt: 5, heightIn: 0.75, count: 3 }, quantity: 1_500 },
};
const marks = new Map(cutKinds.map((kind, index) => [kind, `M${index + 1}`]));
const cuts = () => cutKinds.map((kind) => cutLine(marks.get(kind) ?? '', oneOfEach[kind].cut));

let gc: Company;
let crew: Company;
let scope: ScopeDetailView;

beforeAll(async () => {
  [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
  scope = await publishScope(gc, { cuts: cuts() });
});
afterAll(closeDatabase);

function bidInUsualUnits(): BidInput {
  const input = linesBid(scope, 1);
  if (input.price.form !== 'lines') throw new Error('by lines');
  const kindOf = new Map(scope.body?.cuts.map((line) => [line.id, line.cut.kind]));
  // $1 for one of whatever it is sold by.
  const lines = input.price.lines.map((line) => ({
    ...line,
    unit: usualUnit(kindOf.get(line.cutId) ?? 'line'),
    rate: 10_000,
  }));
  return { ...input, price: { ...input.price, lines } };
}

describe('a scope with every kind of cut', () => {
  it('is published with its sums', () => {
    expect(scope.body?.cuts.map(({ cut }) => cut.kind)).toEqual([...cutKinds]);
    expect(scope.totals).toMatchObject({ pieceCuts: 38, coreHoles: 6 + 123 + 2 });
    expect(scope.methods).toEqual(
      expect.arrayContaining(['flat_saw', 'hand_saw', 'core_drill', 'joint_saw']),
    );
  });

  it('is priced in the unit each kind is sold by, from the scope’s own quantities', async () => {
    const { revision, price } = bidInUsualUnits();
    const answer = await expectStatus(
      crew.owner.client.post(`/api/scopes/${scope.id}/bid-price`, { revision, price }),
      200,
    );
    const { priced } = answer.body as BidPricePreview;
    const quantities = Object.fromEntries(
      priced.lines.map((line, index) => [cutKinds[index] ?? '', line.quantity]),
    );
    expect(quantities).toEqual(Object.fromEntries(cutKinds.map((kind) => [kind, oneOfEach[kind].quantity])));
    const sum = cutKinds.reduce((total, kind) => total + oneOfEach[kind].quantity, 0);
    expect(priced.totalCents).toBe(sum);
  });

  it('refuses a unit in which a cut measures nothing, at its line', async () => {
    const { revision, price } = bidInUsualUnits();
    if (price.form !== 'lines') throw new Error('by lines');
    const at = cutKinds.indexOf('bar');
    const lines = price.lines.map((line, index) => (index === at ? { ...line, unit: 'in_ft' } : line));
    const answer = await crew.owner.client.post(`/api/scopes/${scope.id}/bid-price`, {
      revision,
      price: { ...price, lines },
    });
    expect([answer.status, answer.body.error.fields[0].path]).toEqual([422, `price.lines.${at}.unit`]);
  });

  it('is bid on, awarded, and named cut by cut in the schedule of values; a lump of bars alone as well', async () => {
    const bid = await placeBid(crew, scope.id, bidInUsualUnits());
    await comeDue(gc, scope.id);
    const awarded = await expectStatus(award(gc, scope.id, bid.id), 201);
    const { body } = await expectStatus(
      gc.owner.client.get(`/api/subcontracts/${awarded.body.subcontractId}`),
      200,
    );
    const words = (body as SubcontractView).sov.map(({ description }) => description).join('\n');
    for (const said of [
      `${marks.get('stitch')}: stitch drilling 384 in along the holes, 3.25 in bit, 13 in deep`,
      `${marks.get('wire')}: wire-saw cut 50 sq ft of face`,
      `${marks.get('block')}: 12 × block cut 16 in long, 8 in deep`,
      `${marks.get('bar')}: 24 × bar cut 0.63 in dia.`,
      `${marks.get('lip')}: 3 × lip 5 ft wide, 0.75 in high`,
    ]) {
      expect(words).toContain(said);
    }

    const bars = await publishScope(gc, {
      cuts: [
        cutLine('B1', oneOfEach.bar.cut),
        cutLine('B2', { kind: 'pipe', outsideDiameterIn: 4, count: 8 }),
      ],
    });
    const lump = await placeBid(crew, bars.id, lumpBid(64_000));
    await comeDue(gc, bars.id);
    const second = await expectStatus(award(gc, bars.id, lump.id), 201);
    const paper = await expectStatus(
      gc.owner.client.get(`/api/subcontracts/${second.body.subcontractId}`),
      200,
    );
    // 24 bars and 8 pipes, split by the piece.
    expect((paper.body as SubcontractView).sov.map(({ amountCents }) => amountCents)).toEqual([
      48_000, 16_000,
    ]);
  });

  it('is not published while a cut makes no sense, each fault at its field', async () => {
    const wrong: CutInput[] = [
      { kind: 'stitch', lengthIn: 2, bitDiameterIn: 4, overlapIn: 0.5, depthIn: 8, count: 1 },
      { kind: 'stitch', lengthIn: 90, bitDiameterIn: 4, overlapIn: 4, depthIn: 8, count: 1 },
      { kind: 'bar', diameterIn: 40, count: 1 },
      { kind: 'lip', widthFt: 4, heightIn: 1, runPerRise: 3, count: 1 },
    ];
    const draft = await makeDraft(
      gc,
      completeDraft({ cuts: wrong.map((cut, index) => cutLine(`W${index}`, cut, randomUUID())) }),
    );
    const answer = await gc.owner.client.post(`/api/scopes/${draft.id}/publish`, {
      version: draft.draft?.version,
    });
    expect(answer.status).toBe(422);
    const paths = (answer.body.error.fields as { path: string }[]).map(({ path }) => path);
    expect(paths.sort()).toEqual([
      'cuts.0.cut.lengthIn',
      'cuts.1.cut.overlapIn',
      'cuts.2.cut.diameterIn',
      'cuts.3.cut.runPerRise',
    ]);
  });
});

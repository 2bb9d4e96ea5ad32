import { describe, expect, it } from 'vitest';
import { checkDraft } from './check-draft.ts';
import { prefillResponsibilities } from './responsibilities.ts';
import type { ScopeDraft } from './scope.schema.ts';

const now = new Date('2026-12-01T15:00:00.000Z');

function draft(change: Partial<ScopeDraft> = {}): ScopeDraft {
  return {
    title: 'Drain trench',
    summary: '',
    site: {
      name: 'Annex',
      address: '914 Ninth Street',
      city: 'Denver',
      state: 'CO',
      zip: '80202',
      lat: 39.7491,
      lon: -104.9946,
      timeZone: 'America/Denver',
      contact: null,
    },
    cuts: [
      {
        id: '018f3a1e-0000-7000-8000-000000000001',
        mark: 'T1',
        note: '',
        cut: {
          kind: 'trench',
          lengthFt: 40,
          widthFt: 2,
          thicknessIn: 6,
          count: 1,
          bladeDiameterIn: null,
          removal: null,
        },
      },
    ],
    conditions: {
      element: 'slab_on_grade',
      face: 'floor',
      indoors: false,
      steel: 'mesh',
      postTension: 'proved_none',
      below: 'soil',
      enginesAllowed: true,
      overcutsAllowed: true,
      floor: null,
    },
    responsibilities: prefillResponsibilities({
      kinds: ['trench'],
      indoors: false,
      face: 'floor',
      below: 'soil',
    }).map((row) => ({ ...row })),
    terms: {
      priceForm: 'either',
      retainageBasisPoints: 0,
      standbyFreeMinutes: 30,
      answerDays: 7,
      bidValidDays: 30,
      workFrom: '2027-01-11',
      workTo: '2027-02-05',
      wages: 'open_shop',
    },
    bidding: { mode: 'sealed', dueAt: '2026-12-15T14:00:00-07:00' },
    ...change,
  };
}

const paths = (checked: ReturnType<typeof checkDraft>) =>
  checked.ok ? [] : checked.issues.map((issue) => issue.path);

describe('checkDraft', () => {
  it('reads a whole draft, fields emptied again as never typed, due in UTC', () => {
    const checked = checkDraft(draft(), now);
    if (!checked.ok) throw new Error(JSON.stringify(checked.issues));
    expect(checked.body.bidding.dueAt).toBe('2026-12-15T21:00:00.000Z');
    expect(checked.body.site.contact).toBe('');
    expect(checked.body.cuts[0]?.cut).not.toHaveProperty('bladeDiameterIn');
    // 40 ft twice, 2 ft twice, 6 in deep.
    expect(checked.totals).toMatchObject({ sawFt: 84, inchFeet: 504 });
  });

  it('says everything at once: blanks, the clock, the zone and the engine', () => {
    const [cut] = draft().cuts;
    const checked = checkDraft(
      draft({
        title: '',
        site: { ...draft().site, zip: null, timeZone: 'America/Nowhere' },
        // A 10-in blade has no radius left for an 8-in slab: only the engine knows.
        cuts: [
          {
            ...cut!,
            cut: {
              kind: 'opening',
              lengthFt: 4,
              widthFt: 8,
              thicknessIn: 8,
              corners: 'overcut',
              bladeDiameterIn: 10,
              count: 1,
            },
          },
        ],
        conditions: { ...draft().conditions, indoors: null },
        bidding: { mode: 'sealed', dueAt: '2026-12-01T14:59:59.000Z' },
      }),
      now,
    );
    expect(paths(checked).sort()).toEqual(
      [
        'bidding.dueAt',
        'conditions.indoors',
        'cuts.0.cut.bladeDiameterIn',
        'site.timeZone',
        'site.zip',
        'title',
      ].sort(),
    );
  });

  it('takes no due time more than a year ahead', () => {
    const late = draft({ bidding: { mode: 'sealed', dueAt: '2027-12-05T00:00:00.000Z' } });
    expect(paths(checkDraft(late, now))).toEqual(['bidding.dueAt']);
  });

  it('keeps the answer readable when hundreds of lines are blank', () => {
    const cuts = Array.from({ length: 500 }, (_, at) => ({
      id: `018f3a1e-0000-7000-8000-${String(at).padStart(12, '0')}`,
      mark: '',
      note: '',
      cut: { kind: 'line' },
    }));
    expect(paths(checkDraft(draft({ cuts }), now)).length).toBeLessThanOrEqual(200);
  });
});

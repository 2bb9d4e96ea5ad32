import {
  biddingSchema,
  cutLineSchema,
  readCutList,
  siteSchema,
  type BiddingMode,
  type CutLine,
  type ScopeDraft,
  type ScopeTotals,
} from '@kerfyard/common/scopes';

/** Lines of the cut list that are kept with the row for the sketch on its card. */
export const SKETCH_LINES = 60;

/** What a list shows of a draft: as much as makes sense so far. */
export interface DraftFace {
  title: string;
  mode: BiddingMode | null;
  dueAt: Date | null;
  timeZone: string | null;
  city: string;
  state: string;
  totals: ScopeTotals | null;
  sketch: CutLine[];
  cutCount: number;
}

/** Read the face of a draft; what cannot be read yet is left out, never refused. */
export function readDraftFace(draft: ScopeDraft): DraftFace {
  const lines = draft.cuts.flatMap((line) => cutLineSchema.safeParse(line).data ?? []);
  const reading = readCutList(lines);
  const mode = biddingSchema.shape.mode.safeParse(draft.bidding.mode).data ?? null;
  const dueAt = biddingSchema.shape.dueAt.safeParse(draft.bidding.dueAt).data;
  return {
    title: draft.title.trim().slice(0, 140),
    mode,
    dueAt: dueAt === undefined ? null : new Date(dueAt),
    timeZone: siteSchema.shape.timeZone.safeParse(draft.site.timeZone).data ?? null,
    city: siteSchema.shape.city.safeParse(draft.site.city).data ?? '',
    state: siteSchema.shape.state.safeParse(draft.site.state).data ?? '',
    totals: reading.ok && lines.length > 0 ? reading.totals : null,
    sketch: reading.ok ? lines.slice(0, SKETCH_LINES) : [],
    cutCount: draft.cuts.length,
  };
}

/** The face in the order of the columns from `title` on. */
export function faceColumns(face: DraftFace): unknown[] {
  return [
    face.title,
    face.mode,
    face.dueAt,
    face.timeZone,
    face.city,
    face.state,
    face.totals === null ? null : JSON.stringify(face.totals),
    face.totals?.inchFeet ?? null,
    JSON.stringify(face.sketch),
    face.cutCount,
  ];
}

import type { VisitView } from '@kerfyard/common/visits';

/** A stretch of time that a visit takes, or would take if this window were chosen. */
export interface VisitBlock {
  visit: VisitView;
  startsAt: string;
  endsAt: string;
  isOffer: boolean;
}

/** What stands between two instants, in order: confirmed windows, and for a proposal each window on offer. */
export function blocksBetween(
  span: { startsAt: string; endsAt: string },
  visits: readonly VisitView[],
): VisitBlock[] {
  return visits
    .filter((visit) => visit.status !== 'cancelled')
    .flatMap((visit) =>
      (visit.window === null ? visit.windows : [visit.window]).map((window) => ({
        visit,
        ...window,
        isOffer: visit.window === null,
      })),
    )
    .filter((block) => block.startsAt < span.endsAt && block.endsAt > span.startsAt)
    .sort((a, b) => (a.startsAt < b.startsAt ? -1 : 1));
}

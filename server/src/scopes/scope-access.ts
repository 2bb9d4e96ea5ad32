import { Injectable } from '@nestjs/common';
import type { Actor, Method } from '@kerfyard/common/people';
import type { ScopeStatus } from '@kerfyard/common/scopes';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { toPlace } from './place.ts';
import { SCOPES_OF_FILE, SIGHT, YARD } from './scope-core.queries.ts';

/** The own company sees a scope whole; a crew all that is published, or only what a card says; others nothing. */
export type Sight = 'own' | 'whole' | 'card' | 'nothing';

/** Where a crew's trucks start, how far they go, and what it offers. */
export interface Yard {
  position: { lat: number; lon: number } | null;
  place: string | null;
  serviceRadiusMi: number | null;
  methods: Method[];
}

interface SightRow {
  company_id: string;
  status: ScopeStatus;
  sees_all: boolean;
}

/** Who may see how much of which scope. */
@Injectable()
export class ScopeAccess {
  constructor(private readonly uow: UnitOfWork) {}

  /** How much this person may see; ids that do not exist and ids of others answer alike. */
  async sight(actor: Actor, scopeId: string): Promise<Sight> {
    if (actor.company === null) return 'nothing';
    const isCrew = actor.company.kind === 'cutting_contractor';
    const row = await this.uow.row<SightRow>(null, SIGHT, [scopeId, actor.company.id]);
    if (row === null || row.status === 'discarded') return 'nothing';
    if (row.company_id === actor.company.id) return 'own';
    if (!isCrew || row.status === 'draft') return 'nothing';
    return row.sees_all ? 'whole' : 'card';
  }

  /** The rule for files: photos and drawings go with a scope seen whole. */
  async maySeeFile(actor: Actor, fileId: string): Promise<boolean> {
    const scopes = await this.uow.rows<{ scope_id: string }>(null, SCOPES_OF_FILE, [fileId]);
    for (const { scope_id: scopeId } of scopes) {
      const sight = await this.sight(actor, scopeId);
      if (sight === 'own' || sight === 'whole') return true;
    }
    return false;
  }

  async yard(companyId: string): Promise<Yard> {
    const row = await this.uow.row<{
      yard_lat: number | null;
      yard_lon: number | null;
      service_radius_mi: number | null;
      methods: Method[];
    }>(null, YARD, [companyId]);
    const position =
      row === null || row.yard_lat === null || row.yard_lon === null
        ? null
        : { lat: row.yard_lat, lon: row.yard_lon };
    return {
      position,
      place: position === null ? null : toPlace(position),
      serviceRadiusMi: row?.service_radius_mi ?? null,
      methods: row?.methods ?? [],
    };
  }
}

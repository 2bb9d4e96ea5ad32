import type { Method } from '@kerfyard/common/people';
import type {
  BiddingMode,
  CutLine,
  Plugs,
  ScopeBody,
  ScopeDraft,
  ScopeStatus,
  ScopeTotals,
} from '@kerfyard/common/scopes';

/** A row of `scope`. BIGINT columns are strings until `toNumber` has read them. */
export interface ScopeRow {
  id: string;
  company_id: string;
  number: string;
  status: ScopeStatus;
  created_by: string;
  draft_version: number;
  revision: number | null;
  title: string;
  mode: BiddingMode | null;
  due_at: Date | null;
  extensions: number;
  time_zone: string | null;
  city: string;
  state: string;
  lat: number | null;
  lon: number | null;
  methods: Method[];
  indoors: boolean;
  inch_feet: number | null;
  totals: ScopeTotals | null;
  sketch: CutLine[];
  cut_count: number;
  plugs: Plugs['plugs'];
  published_at: Date | null;
  opened_at: Date | null;
  closed_reason: string | null;
  seq: string;
  bid_seq: string;
  created_at: Date;
  updated_at: Date;
}

export interface ScopeRowWithDraft extends ScopeRow {
  draft: ScopeDraft | null;
}

/** A published revision with the row of its scope. */
export interface PublishedScope {
  scope: ScopeRow;
  revision: number;
  body: ScopeBody;
  totals: ScopeTotals;
}

import type { CompanyView } from '../api/index.ts';
import type { FileView } from '../files/index.ts';
import type { CompletionView } from '../completions/completion.views.ts';
import type { FundingView, MoneyLineView, ReleaseView } from '../payments/payment.views.ts';
import type { CutLine } from '../scopes/cut.schema.ts';
import type { Conditions, Site } from '../scopes/scope.schema.ts';
import type { ScopeTotals } from '../scopes/scope.views.ts';
import type { VisitView } from '../visits/visit.views.ts';
import type { SubcontractStatus } from './subcontract.state.ts';

/** Where one line of the schedule of values stands. */
export type SovLineState =
  'not_set_aside' | 'setting_aside' | 'set_aside' | 'submitted' | 'accepted' | 'released';

export interface SovLineView {
  id: string;
  position: number;
  description: string;
  cutIds: string[];
  amountCents: number;
  state: SovLineState;
}

export interface SignatureView {
  side: 'gc' | 'crew';
  personName: string;
  typedName: string;
  signedAt: string;
  ip: string;
  documentSha256: string;
}

/** `GET /api/subcontracts` row. */
export interface SubcontractListItem {
  id: string;
  number: string;
  title: string;
  status: SubcontractStatus;
  gc: CompanyView;
  crew: CompanyView;
  city: string;
  state: string;
  timeZone: string;
  cuts: CutLine[];
  money: MoneyLineView;
  nextVisitAt: string | null;
}

/** `GET /api/subcontracts/:id`. */
export interface SubcontractView {
  id: string;
  number: string;
  scopeId: string;
  threadId: string;
  title: string;
  status: SubcontractStatus;
  side: 'gc' | 'crew';
  gc: CompanyView;
  crew: CompanyView;
  site: Site;
  conditions: Conditions;
  cuts: CutLine[];
  totals: ScopeTotals;
  sov: SovLineView[];
  totalCents: number;
  retainageBasisPoints: number;
  /** The paper: the file as stored and its hash; after both have signed, the one with the signature page. */
  document: { fileId: string; sha256: string };
  signedDocument: { fileId: string; sha256: string } | null;
  signatures: SignatureView[];
  signBy: string;
  money: MoneyLineView;
  fundings: FundingView[];
  releases: ReleaseView[];
  visits: VisitView[];
  completions: CompletionView[];
  files: FileView[];
  payoutsReady: boolean;
}

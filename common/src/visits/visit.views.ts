import type { CompanyView } from '../api/index.ts';
import type { VisitWindow } from './visit.schema.ts';
import type { VisitStatus } from './visit.state.ts';

export interface VisitView {
  id: string;
  subcontractId: string;
  subcontractNumber: string;
  title: string;
  status: VisitStatus;
  crew: { id: string; name: string };
  truck: { id: string; name: string };
  gc: CompanyView;
  cuttingContractor: CompanyView;
  city: string;
  state: string;
  timeZone: string;
  sovLineIds: string[];
  /** Windows on offer while proposed. */
  windows: VisitWindow[];
  /** The confirmed window. */
  window: VisitWindow | null;
  note: string;
  /** Whether the money for all its lines is set aside: only then may it start. */
  linesSetAside: boolean;
  startedAt: string | null;
  finishedAt: string | null;
  cancelReason: string | null;
}

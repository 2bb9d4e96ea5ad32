import type { FileView } from '../files/index.ts';
import type { AsCut } from './completion.schema.ts';
import type { CompletionStatus } from './completion.state.ts';

export interface CompletionView {
  id: string;
  subcontractId: string;
  visitId: string;
  status: CompletionStatus;
  sovLineIds: string[];
  amountCents: number;
  asCut: AsCut[];
  photos: FileView[];
  note: string;
  submittedBy: string;
  submittedAt: string;
  acceptedBy: string | null;
  acceptedAt: string | null;
  /** By when the general contractor has agreed to answer. */
  answerBy: string;
}

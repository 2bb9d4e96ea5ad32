import { Injectable } from '@nestjs/common';
import type { CompletionStatus } from '@kerfyard/common/completions';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import {
  COMPLETE_SUBCONTRACT,
  COMPLETION_RELEASED,
  COMPLETION_WITH_LINES,
} from './completion-states.queries.ts';

export interface CompletionState {
  id: string;
  subcontractId: string;
  status: CompletionStatus;
  sovLineIds: string[];
}

interface Row {
  id: string;
  subcontract_id: string;
  status: CompletionStatus;
  sov_line_ids: string[];
}

/** What releasing money needs of a completion. Callers hold the subcontract's row lock. */
@Injectable()
export class CompletionStates {
  constructor(private readonly uow: UnitOfWork) {}

  async find(tx: Tx, completionId: string): Promise<CompletionState | null> {
    const row = await this.uow.row<Row>(tx, COMPLETION_WITH_LINES, [completionId]);
    if (row === null) return null;
    return {
      id: row.id,
      subcontractId: row.subcontract_id,
      status: row.status,
      sovLineIds: row.sov_line_ids,
    };
  }

  /** accepted → released; the last line released completes the subcontract. */
  async markReleased(tx: Tx, completionId: string): Promise<void> {
    const moved = await this.uow.row<{ subcontract_id: string }>(tx, COMPLETION_RELEASED, [completionId]);
    if (moved === null) throw new AppError('illegal_move');
    await this.uow.rows(tx, COMPLETE_SUBCONTRACT, [moved.subcontract_id]);
  }
}

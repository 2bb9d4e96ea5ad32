import { Injectable } from '@nestjs/common';
import type { CompletionStatus, CompletionView } from '@kerfyard/common/completions';
import { FilesService } from '../files/files.service.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import {
  COMPLETION_BY_ID,
  COMPLETIONS_OF_SUBCONTRACT,
  STANDING_COMPLETION_LINES,
} from './completion.queries.ts';
import { presentCompletion, type CompletionRow } from './completion.presenter.ts';

/** Reads completions; the caller has checked access to their subcontract. */
@Injectable()
export class CompletionReader {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly files: FilesService,
  ) {}

  async ofSubcontract(subcontractId: string): Promise<CompletionView[]> {
    return this.present(
      await this.uow.rows<CompletionRow>(null, COMPLETIONS_OF_SUBCONTRACT, [subcontractId]),
    );
  }

  async one(completionId: string): Promise<CompletionView> {
    const [view] = await this.present(
      await this.uow.rows<CompletionRow>(null, COMPLETION_BY_ID, [completionId]),
    );
    if (view === undefined) throw new AppError('not_found');
    return view;
  }

  /** How far each line of the schedule of values is that stands in a completion. */
  async standingLines(subcontractId: string): Promise<Map<string, CompletionStatus>> {
    const rows = await this.uow.rows<{ sov_line_id: string; status: CompletionStatus }>(
      null,
      STANDING_COMPLETION_LINES,
      [subcontractId],
    );
    return new Map(rows.map((row) => [row.sov_line_id, row.status]));
  }

  private async present(rows: readonly CompletionRow[]): Promise<CompletionView[]> {
    const files = await this.files.views(rows.flatMap((row) => row.photo_ids));
    return rows.map((row) => presentCompletion(row, files));
  }
}

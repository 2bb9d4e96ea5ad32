import { Injectable, type OnModuleInit } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import { FileAccess } from '../files/file-access.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { WatchAccess } from '../platform/realtime/watch-access.ts';
import { IS_SIDE, MAY_READ_FILE } from './subcontract.queries.ts';

/** What being a side of a subcontract opens: its papers, its scope's files, its completion photos, its live hints. */
@Injectable()
export class SubcontractAccess implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly fileAccess: FileAccess,
    private readonly watchAccess: WatchAccess,
  ) {}

  onModuleInit(): void {
    this.fileAccess.register((actor, fileId) => this.mayReadFile(actor, fileId));
    this.watchAccess.register('subcontract', (actor, id) => this.mayWatch(actor, id));
  }

  private async mayReadFile(actor: Actor, fileId: string): Promise<boolean> {
    if (actor.company === null) return false;
    return (await this.uow.row(null, MAY_READ_FILE, [actor.company.id, fileId])) !== null;
  }

  private async mayWatch(actor: Actor, id: string): Promise<boolean> {
    if (actor.company === null) return false;
    return (await this.uow.row(null, IS_SIDE, [actor.company.id, id])) !== null;
  }
}

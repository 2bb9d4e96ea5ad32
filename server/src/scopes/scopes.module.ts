import { Module, type OnModuleInit } from '@nestjs/common';
import { BidCoreModule } from '../bids/bid-core.module.ts';
import { FileAccess } from '../files/file-access.ts';
import { FilesModule } from '../files/files.module.ts';
import { WatchAccess } from '../platform/realtime/watch-access.ts';
import { ComeDueJobs } from './come-due-jobs.ts';
import { EndScope } from './end-scope.ts';
import { PublishScope } from './publish-scope.ts';
import { ScopeAccess } from './scope-access.ts';
import { ScopeCoreModule } from './scope-core.module.ts';
import { ScopeDetail } from './scope-detail.ts';
import { ScopeDrafts } from './scope-drafts.ts';
import { ScopeFiles } from './scope-files.ts';
import { ScopeJobs } from './scope-jobs.ts';
import { ScopeLists } from './scope-lists.ts';
import { ScopeMails } from './scope-mails.ts';
import { ScopesController } from './scopes.controller.ts';
import { TellCrews } from './tell-crews.ts';

@Module({
  imports: [ScopeCoreModule, BidCoreModule, FilesModule],
  controllers: [ScopesController],
  providers: [
    ComeDueJobs,
    EndScope,
    PublishScope,
    ScopeDetail,
    ScopeDrafts,
    ScopeFiles,
    ScopeJobs,
    ScopeLists,
    ScopeMails,
    TellCrews,
  ],
  exports: [ScopeCoreModule, ComeDueJobs],
})
export class ScopesModule implements OnModuleInit {
  constructor(
    private readonly fileAccess: FileAccess,
    private readonly watchAccess: WatchAccess,
    private readonly access: ScopeAccess,
  ) {}

  onModuleInit(): void {
    this.fileAccess.register((actor, fileId) => this.access.maySeeFile(actor, fileId));
    this.watchAccess.register(
      'scope',
      async (actor, id) => (await this.access.sight(actor, id)) !== 'nothing',
    );
  }
}

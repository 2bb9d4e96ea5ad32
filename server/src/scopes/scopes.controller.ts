import { Body, Controller, Delete, Get, HttpCode, Param, Post, Put, Query } from '@nestjs/common';
import { idSchema, type Page } from '@kerfyard/common/api';
import type { FileView } from '@kerfyard/common/files';
import type { Actor } from '@kerfyard/common/people';
import {
  attachFileSchema,
  closeScopeSchema,
  createScopeSchema,
  openScopesQuerySchema,
  ownScopesQuerySchema,
  publishScopeSchema,
  saveDraftSchema,
  type OpenScopesQuery,
  type OwnScopesQuery,
  type OwnScopeView,
  type ScopeCardView,
  type ScopeDetailView,
} from '@kerfyard/common/scopes';
import type { z } from 'zod';
import { CurrentActor, Needs, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { EndScope } from './end-scope.ts';
import { PublishScope } from './publish-scope.ts';
import { ScopeDetail } from './scope-detail.ts';
import { ScopeDrafts } from './scope-drafts.ts';
import { ScopeFiles } from './scope-files.ts';
import { ScopeLists } from './scope-lists.ts';

const id = { schema: idSchema };

@Controller()
export class ScopesController {
  constructor(
    private readonly drafts: ScopeDrafts,
    private readonly files: ScopeFiles,
    private readonly publishing: PublishScope,
    private readonly ending: EndScope,
    private readonly lists: ScopeLists,
    private readonly detail: ScopeDetail,
  ) {}

  @Get('scopes')
  @Needs('scope.read')
  own(
    @CurrentActor() actor: Actor,
    @Query({ schema: ownScopesQuerySchema }) query: OwnScopesQuery,
  ): Promise<Page<OwnScopeView>> {
    return this.lists.own(actor, query);
  }

  @Get('open-scopes')
  @Needs('scope.read')
  open(
    @CurrentActor() actor: Actor,
    @Query({ schema: openScopesQuerySchema }) query: OpenScopesQuery,
  ): Promise<Page<ScopeCardView>> {
    return this.lists.open(actor, query);
  }

  @Get('scopes/:id')
  @Needs('scope.read')
  one(@CurrentActor() actor: Actor, @Param('id', id) scopeId: string): Promise<ScopeDetailView> {
    return this.detail.view(actor, scopeId);
  }

  @Post('scopes')
  @Needs('scope.write')
  async create(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Body({ schema: createScopeSchema }) input: z.output<typeof createScopeSchema>,
  ): Promise<ScopeDetailView> {
    await this.drafts.create(actor, origin, input);
    return this.detail.view(actor, input.id);
  }

  @Put('scopes/:id/draft')
  @Needs('scope.write')
  save(
    @CurrentActor() actor: Actor,
    @Param('id', id) scopeId: string,
    @Body({ schema: saveDraftSchema }) input: z.output<typeof saveDraftSchema>,
  ): Promise<{ version: number }> {
    return this.drafts.save(actor, scopeId, input);
  }

  @Delete('scopes/:id')
  @Needs('scope.write')
  @HttpCode(204)
  discard(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', id) scopeId: string,
  ): Promise<void> {
    return this.drafts.discard(actor, origin, scopeId);
  }

  @Post('scopes/:id/publish')
  @Needs('scope.write')
  @HttpCode(200)
  async publish(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', id) scopeId: string,
    @Body({ schema: publishScopeSchema }) input: z.output<typeof publishScopeSchema>,
  ): Promise<ScopeDetailView> {
    await this.publishing.publish(actor, origin, scopeId, input.version);
    return this.detail.view(actor, scopeId);
  }

  @Post('scopes/:id/files')
  @Needs('scope.write')
  attach(
    @CurrentActor() actor: Actor,
    @Param('id', id) scopeId: string,
    @Body({ schema: attachFileSchema }) input: z.output<typeof attachFileSchema>,
  ): Promise<FileView[]> {
    return this.files.attach(actor, scopeId, input);
  }

  @Delete('scopes/:id/files/:fileId')
  @Needs('scope.write')
  @HttpCode(204)
  detach(
    @CurrentActor() actor: Actor,
    @Param('id', id) scopeId: string,
    @Param('fileId', id) fileId: string,
  ): Promise<void> {
    return this.files.detach(actor, scopeId, fileId);
  }

  @Post('scopes/:id/withdraw')
  @Needs('scope.write')
  @HttpCode(200)
  async withdraw(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', id) scopeId: string,
  ): Promise<ScopeDetailView> {
    await this.ending.withdraw(actor, origin, scopeId);
    return this.detail.view(actor, scopeId);
  }

  @Post('scopes/:id/close')
  @Needs('scope.write')
  @HttpCode(200)
  async close(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', id) scopeId: string,
    @Body({ schema: closeScopeSchema }) input: z.output<typeof closeScopeSchema>,
  ): Promise<ScopeDetailView> {
    await this.ending.close(actor, origin, scopeId, input.reason);
    return this.detail.view(actor, scopeId);
  }
}

import {
  Controller,
  Get,
  Param,
  Post,
  Query,
  Req,
  Res,
  StreamableFile,
  UseInterceptors,
} from '@nestjs/common';
import type { Request, Response } from 'express';
import { idSchema } from '@kerfyard/common/api';
import type { UploadResult } from '@kerfyard/common/files';
import type { Actor } from '@kerfyard/common/people';
import {
  CurrentActor,
  Needs,
  RequestOrigin,
  SignedIn,
  type Origin,
} from '../platform/auth/access.decorators.ts';
import { Idempotent } from '../platform/idempotency/idempotent.decorator.ts';
import { ReadFile } from './read-file.ts';
import { UploadFiles } from './upload-files.ts';
import { fileQuerySchema, readUploadFields, type FileQuery } from './upload.schema.ts';
import { incomingFiles, UploadInterceptor } from './upload.interceptor.ts';

@Controller('files')
export class FilesController {
  constructor(
    private readonly uploadFiles: UploadFiles,
    private readonly readFile: ReadFile,
  ) {}

  @Post()
  @Needs('file.upload')
  // The body is read first, so that the key is held against it.
  @Idempotent()
  @UseInterceptors(UploadInterceptor)
  upload(
    @CurrentActor() actor: Actor,
    @Req() request: Request,
    @RequestOrigin() origin: Origin,
  ): Promise<UploadResult> {
    const { kind } = readUploadFields(request.body);
    return this.uploadFiles.run(actor, { kind, files: incomingFiles(request) }, origin);
  }

  @Get(':id')
  @SignedIn()
  async read(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) id: string,
    @Query({ schema: fileQuerySchema }) query: FileQuery,
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
  ): Promise<StreamableFile | undefined> {
    const file = await this.readFile.run(actor, id, query.size);
    response.set(file.headers);
    if (request.fresh) return void response.status(304);
    const { stream, bytes } = await file.open();
    return new StreamableFile(stream, { length: bytes });
  }
}

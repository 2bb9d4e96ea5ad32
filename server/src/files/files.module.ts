import { Global, Module } from '@nestjs/common';
import { FileAccess } from './file-access.ts';
import { FilesController } from './files.controller.ts';
import { FilesService } from './files.service.ts';
import { ReadFile } from './read-file.ts';
import { UploadFiles } from './upload-files.ts';
import { UploadInterceptor } from './upload.interceptor.ts';

/** Photos and drawings. Global: scopes, talk, papers and completions all link to files and say who may read them. */
@Global()
@Module({
  controllers: [FilesController],
  providers: [FilesService, FileAccess, UploadFiles, ReadFile, UploadInterceptor],
  exports: [FilesService, FileAccess, UploadFiles],
})
export class FilesModule {}

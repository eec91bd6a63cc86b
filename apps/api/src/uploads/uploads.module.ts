import { Module } from '@nestjs/common';
import { UploadCompletionService } from './upload-completion.service';
import { UploadsController } from './uploads.controller';
import { UploadsService } from './uploads.service';

@Module({ controllers: [UploadsController], providers: [UploadsService, UploadCompletionService] })
export class UploadsModule {}

import { Module } from '@nestjs/common';
import { PartDeletionsController } from './part-deletions.controller';
import { PartDeletionsService } from './part-deletions.service';

@Module({ controllers: [PartDeletionsController], providers: [PartDeletionsService] })
export class PartDeletionsModule {}

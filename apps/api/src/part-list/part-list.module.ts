import { Module } from '@nestjs/common';
import { PartListController } from './part-list.controller';
import { PartListService } from './part-list.service';

@Module({ controllers: [PartListController], providers: [PartListService] })
export class PartListModule {}

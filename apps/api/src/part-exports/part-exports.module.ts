import { Module } from '@nestjs/common';
import { PartExportsController } from './part-exports.controller';
import { PartExportsService } from './part-exports.service';

@Module({ controllers: [PartExportsController], providers: [PartExportsService] })
export class PartExportsModule {}

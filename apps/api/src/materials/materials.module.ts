import { Module } from '@nestjs/common';
import { MaterialTablesService } from './material-tables.service';
import { MaterialUsesService } from './material-uses.service';
import { MaterialsController } from './materials.controller';
import { MaterialsService } from './materials.service';

@Module({ controllers: [MaterialsController], providers: [MaterialsService, MaterialUsesService, MaterialTablesService] })
export class MaterialsModule {}

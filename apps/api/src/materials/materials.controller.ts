import { Body, Controller, Get, Inject, Param, Patch, Post, Query, Res } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { z } from 'zod';
import {
  changeMaterialRequest,
  createMaterialRequest,
  importMaterialsAnswer,
  importMaterialsRequest,
  keptText,
  material,
  materialList,
  materialListQuery,
  materialUses,
  type ChangeMaterialRequest,
  type CreateMaterialRequest,
  type ImportMaterialsAnswer,
  type ImportMaterialsRequest,
  type Material,
  type MaterialList,
  type MaterialListQuery,
  type MaterialUses,
} from '@masswright/contracts';
import { describeAttachment, makeFileName } from '../platform/attachment';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { MaterialTablesService } from './material-tables.service';
import { MaterialUsesService } from './material-uses.service';
import { MaterialsService } from './materials.service';

/** A word for a material of the starter library, a uuid for an own one. */
const materialId = keptText().max(80);

@ApiTags('materials')
@Controller('materials')
export class MaterialsController {
  constructor(
    @Inject(MaterialsService) private readonly service: MaterialsService,
    @Inject(MaterialUsesService) private readonly uses: MaterialUsesService,
    @Inject(MaterialTablesService) private readonly tables: MaterialTablesService,
  ) {}

  @Get()
  @Operation({ summary: 'The materials of the starter library and the organisation’s own', answer: materialList })
  list(@SignedIn() context: SignedInContext, @Query({ schema: materialListQuery }) query: MaterialListQuery): Promise<MaterialList> {
    return this.service.list(context, query);
  }

  @Post()
  @Operation({ summary: 'Add a material', status: 201, answer: material })
  create(@SignedIn() context: SignedInContext, @Body({ schema: createMaterialRequest }) request: CreateMaterialRequest): Promise<Material> {
    return this.service.create(context, request);
  }

  @Get('export')
  @Operation({ summary: 'The library as a table', file: { 'text/csv': z.string() } })
  async export(@SignedIn() context: SignedInContext, @Res() response: Response): Promise<void> {
    const table = await this.tables.write(context);
    describeAttachment(response, { fileName: makeFileName('Materials', 'csv'), mediaType: 'text/csv' });
    response.send(table);
  }

  @Post('import')
  @Operation({ summary: 'Take materials from a table, or say what that would do', answer: importMaterialsAnswer })
  import(@SignedIn() context: SignedInContext, @Body({ schema: importMaterialsRequest }) request: ImportMaterialsRequest): Promise<ImportMaterialsAnswer> {
    return this.tables.read(context, request);
  }

  @Patch(':materialId')
  @Operation({ summary: 'Change or archive a material of the organisation', answer: material })
  change(@SignedIn() context: SignedInContext, @Param('materialId', { schema: materialId }) id: string, @Body({ schema: changeMaterialRequest }) request: ChangeMaterialRequest): Promise<Material> {
    return this.service.change(context, id, request);
  }

  @Get(':materialId/parts')
  @Operation({ summary: 'The parts that are set to a material, and what its present density would make of them', answer: materialUses })
  listUses(@SignedIn() context: SignedInContext, @Param('materialId', { schema: materialId }) id: string): Promise<MaterialUses> {
    return this.uses.list(context, id);
  }
}

import { Body, Controller, Get, Inject, Param, Patch, Post, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { createProjectRequest, id, page, pageQuery, project, renameProjectRequest, type CreateProjectRequest, type Page, type PageQuery, type Project, type RenameProjectRequest } from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { ProjectsService } from './projects.service';

@ApiTags('projects')
@Controller('projects')
export class ProjectsController {
  constructor(@Inject(ProjectsService) private readonly service: ProjectsService) {}

  @Get()
  @Operation({ summary: 'The projects of the organisation, by name', answer: page(project) })
  list(@SignedIn() context: SignedInContext, @Query({ schema: pageQuery }) query: PageQuery): Promise<Page<Project>> {
    return this.service.list(context, query);
  }

  @Post()
  @Operation({ summary: 'Make a project', status: 201, answer: project })
  create(@SignedIn() context: SignedInContext, @Body({ schema: createProjectRequest }) request: CreateProjectRequest): Promise<Project> {
    return this.service.create(context, request.name);
  }

  @Get(':projectId')
  @Operation({ summary: 'A project', answer: project })
  get(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string): Promise<Project> {
    return this.service.get(context, projectId);
  }

  @Patch(':projectId')
  @Operation({ summary: 'Rename a project', answer: project })
  rename(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Body({ schema: renameProjectRequest }) request: RenameProjectRequest): Promise<Project> {
    return this.service.rename(context, projectId, request.name);
  }
}

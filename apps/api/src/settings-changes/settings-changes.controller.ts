import { Body, Controller, Inject, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { changeSettingsRequest, id, settingsChange, type ChangeSettingsRequest, type SettingsChange } from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { SettingsChangesService } from './settings-changes.service';

@ApiTags('parts')
@Controller()
export class SettingsChangesController {
  constructor(@Inject(SettingsChangesService) private readonly service: SettingsChangesService) {}

  @Post('projects/:projectId/setting-changes')
  @Operation({ summary: 'Change the unit, density, material or axis of many parts at once', status: 201, answer: settingsChange })
  change(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Body({ schema: changeSettingsRequest }) request: ChangeSettingsRequest): Promise<SettingsChange> {
    return this.service.change(context, projectId, request);
  }

  @Post('setting-changes/:changeId/undo')
  @Operation({ summary: 'Take a change of many settings back, as far as nobody has changed the same since', status: 201, answer: settingsChange })
  undo(@SignedIn() context: SignedInContext, @Param('changeId', { schema: id }) changeId: string): Promise<SettingsChange> {
    return this.service.undo(context, changeId);
  }
}

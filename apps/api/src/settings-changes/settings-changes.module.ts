import { Module } from '@nestjs/common';
import { SettingsChangesController } from './settings-changes.controller';
import { SettingsChangesService } from './settings-changes.service';

@Module({ controllers: [SettingsChangesController], providers: [SettingsChangesService] })
export class SettingsChangesModule {}

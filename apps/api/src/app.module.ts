import { Module, type DynamicModule } from '@nestjs/common';
import { APP_GUARD, APP_PIPE } from '@nestjs/core';
import type { Logger } from '@masswright/logs';
import { EventsModule } from './events/events.module';
import { HealthModule } from './health/health.module';
import { InvitationsModule } from './invitations/invitations.module';
import { MaterialsModule } from './materials/materials.module';
import { PartDeletionsModule } from './part-deletions/part-deletions.module';
import { PartExportsModule } from './part-exports/part-exports.module';
import { PartListModule } from './part-list/part-list.module';
import { PartsModule } from './parts/parts.module';
import { PasswordResetsModule } from './password-resets/password-resets.module';
import { PeopleModule } from './people/people.module';
import type { ApiSettings } from './platform/api-settings';
import { OriginGuard } from './platform/origin.guard';
import { PlatformModule } from './platform/platform.module';
import { ContractValidationPipe } from './platform/validation.pipe';
import { ProjectsModule } from './projects/projects.module';
import { SessionGuard } from './session/session.guard';
import { SessionModule } from './session/session.module';
import { SettingsChangesModule } from './settings-changes/settings-changes.module';
import { UploadsModule } from './uploads/uploads.module';

@Module({})
export class AppModule {
  static with(settings: ApiSettings, logger: Logger): DynamicModule {
    return {
      module: AppModule,
      imports: [
        PlatformModule.with(settings, logger),
        SessionModule,
        PeopleModule,
        InvitationsModule,
        PasswordResetsModule,
        ProjectsModule,
        PartListModule,
        PartExportsModule,
        PartDeletionsModule,
        SettingsChangesModule,
        PartsModule,
        MaterialsModule,
        UploadsModule,
        EventsModule,
        HealthModule,
      ],
      providers: [
        { provide: APP_GUARD, useValue: new OriginGuard(settings.PUBLIC_URL) },
        { provide: APP_GUARD, useClass: SessionGuard },
        { provide: APP_PIPE, useClass: ContractValidationPipe },
      ],
    };
  }
}

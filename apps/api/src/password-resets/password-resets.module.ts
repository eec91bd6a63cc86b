import { Module } from '@nestjs/common';
import { SessionModule } from '../session/session.module';
import { PasswordResetsController } from './password-resets.controller';
import { PasswordResetsService } from './password-resets.service';

@Module({ imports: [SessionModule], controllers: [PasswordResetsController], providers: [PasswordResetsService] })
export class PasswordResetsModule {}

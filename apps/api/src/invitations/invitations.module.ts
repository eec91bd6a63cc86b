import { Module } from '@nestjs/common';
import { SessionModule } from '../session/session.module';
import { InvitationsController } from './invitations.controller';
import { InvitationsService } from './invitations.service';

@Module({ imports: [SessionModule], controllers: [InvitationsController], providers: [InvitationsService] })
export class InvitationsModule {}

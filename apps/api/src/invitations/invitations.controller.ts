import { Body, Controller, Delete, Get, Inject, Param, Post, Query, Res } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import {
  acceptInvitationRequest,
  createInvitationRequest,
  id,
  invitation,
  invitationLookupRequest,
  openInvitation,
  page,
  pageQuery,
  session,
  type AcceptInvitationRequest,
  type CreateInvitationRequest,
  type Invitation,
  type InvitationLookupRequest,
  type OpenInvitation,
  type Page,
  type PageQuery,
  type Session,
} from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, Visitor, type RequestContext, type SignedInContext } from '../platform/request-context';
import { Public } from '../session/session.guard';
import { InvitationsService } from './invitations.service';

@ApiTags('people')
@Controller('invitations')
export class InvitationsController {
  constructor(@Inject(InvitationsService) private readonly service: InvitationsService) {}

  @Get()
  @Operation({ summary: 'Invitations that are not accepted yet, by e-mail address', answer: page(invitation) })
  list(@SignedIn() context: SignedInContext, @Query({ schema: pageQuery }) query: PageQuery): Promise<Page<Invitation>> {
    return this.service.list(context, query);
  }

  @Post()
  @Operation({ summary: 'Invite a person by e-mail', status: 201, answer: invitation })
  create(@SignedIn() context: SignedInContext, @Body({ schema: createInvitationRequest }) request: CreateInvitationRequest): Promise<Invitation> {
    return this.service.create(context, request);
  }

  @Delete(':invitationId')
  @Operation({ summary: 'Withdraw an invitation', status: 204 })
  withdraw(@SignedIn() context: SignedInContext, @Param('invitationId', { schema: id }) invitationId: string): Promise<void> {
    return this.service.withdraw(context, invitationId);
  }

  @Public()
  @Post('lookup')
  @Operation({ summary: 'What the invitation of a mailed link is', answer: openInvitation })
  lookUp(@Visitor() context: RequestContext, @Body({ schema: invitationLookupRequest }) request: InvitationLookupRequest): Promise<OpenInvitation> {
    return this.service.lookUp(context, request.token);
  }

  @Public()
  @Post('acceptance')
  @Operation({ summary: 'Accept an invitation and sign in', answer: session })
  accept(@Visitor() context: RequestContext, @Body({ schema: acceptInvitationRequest }) request: AcceptInvitationRequest, @Res({ passthrough: true }) response: Response): Promise<Session> {
    return this.service.accept(context, request, response);
  }
}

import { Body, Controller, Get, Inject, Post, Put, Res } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { session, signInRequest, signUpRequest, switchOrganisationRequest, type Session, type SignInRequest, type SignUpRequest, type SwitchOrganisationRequest } from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, Visitor, type RequestContext, type SignedInContext } from '../platform/request-context';
import { Public } from './session.guard';
import { SessionService } from './session.service';

@ApiTags('session')
@Controller()
export class SessionController {
  constructor(@Inject(SessionService) private readonly service: SessionService) {}

  @Public()
  @Post('sign-up')
  @Operation({ summary: 'Make an account and an organisation, and sign in', status: 201, answer: session })
  signUp(@Visitor() context: RequestContext, @Body({ schema: signUpRequest }) request: SignUpRequest, @Res({ passthrough: true }) response: Response): Promise<Session> {
    return this.service.signUp(context, request, response);
  }

  @Public()
  @Post('sign-in')
  @Operation({ summary: 'Sign in', answer: session })
  signIn(@Visitor() context: RequestContext, @Body({ schema: signInRequest }) request: SignInRequest, @Res({ passthrough: true }) response: Response): Promise<Session> {
    return this.service.signIn(context, request, response);
  }

  @Public()
  @Post('sign-out')
  @Operation({ summary: 'Sign out', status: 204 })
  signOut(@Visitor() context: RequestContext, @Res({ passthrough: true }) response: Response): Promise<void> {
    return this.service.signOut(context, response);
  }

  @Get('session')
  @Operation({ summary: 'Who is signed in, and where', answer: session })
  describe(@SignedIn() context: SignedInContext): Promise<Session> {
    return this.service.describe(context);
  }

  @Put('session/organisation')
  @Operation({ summary: 'Switch to another organisation of yours', answer: session })
  switchOrganisation(@SignedIn() context: SignedInContext, @Body({ schema: switchOrganisationRequest }) request: SwitchOrganisationRequest): Promise<Session> {
    return this.service.switchOrganisation(context, request.organisationId);
  }
}

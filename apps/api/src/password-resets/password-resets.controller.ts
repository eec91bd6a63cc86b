import { Body, Controller, Inject, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { accepted, passwordResetCompletionRequest, passwordResetRequest, type Accepted, type PasswordResetCompletionRequest, type PasswordResetRequest } from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { Visitor, type RequestContext } from '../platform/request-context';
import { Public } from '../session/session.guard';
import { PasswordResetsService } from './password-resets.service';

@ApiTags('session')
@Controller('password-resets')
export class PasswordResetsController {
  constructor(@Inject(PasswordResetsService) private readonly service: PasswordResetsService) {}

  @Public()
  @Post()
  @Operation({ summary: 'Ask for a mail with a link to set a new password', status: 202, answer: accepted })
  request(@Visitor() context: RequestContext, @Body({ schema: passwordResetRequest }) request: PasswordResetRequest): Promise<Accepted> {
    return this.service.request(context, request.email);
  }

  @Public()
  @Post('completion')
  @Operation({ summary: 'Set a new password by a mailed link; every session of the person ends', status: 204 })
  complete(@Visitor() context: RequestContext, @Body({ schema: passwordResetCompletionRequest }) request: PasswordResetCompletionRequest): Promise<void> {
    return this.service.complete(context, request);
  }
}

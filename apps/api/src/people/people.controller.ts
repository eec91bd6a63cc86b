import { Body, Controller, Delete, Get, Inject, Param, Patch, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { changeRoleRequest, id, member, page, pageQuery, type ChangeRoleRequest, type Member, type Page, type PageQuery } from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { PeopleService } from './people.service';

@ApiTags('people')
@Controller('members')
export class PeopleController {
  constructor(@Inject(PeopleService) private readonly service: PeopleService) {}

  @Get()
  @Operation({ summary: 'The people of the organisation, by e-mail address', answer: page(member) })
  list(@SignedIn() context: SignedInContext, @Query({ schema: pageQuery }) query: PageQuery): Promise<Page<Member>> {
    return this.service.list(context, query);
  }

  @Patch(':userId')
  @Operation({ summary: 'Give a person another role', answer: member })
  changeRole(@SignedIn() context: SignedInContext, @Param('userId', { schema: id }) userId: string, @Body({ schema: changeRoleRequest }) request: ChangeRoleRequest): Promise<Member> {
    return this.service.changeRole(context, userId, request.role);
  }

  @Delete(':userId')
  @Operation({ summary: 'Remove a person; their sessions here end at once', status: 204 })
  remove(@SignedIn() context: SignedInContext, @Param('userId', { schema: id }) userId: string): Promise<void> {
    return this.service.remove(context, userId);
  }
}

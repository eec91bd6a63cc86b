import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { Response } from 'express';
import { z } from 'zod';
import type { AcceptInvitationRequest, CreateInvitationRequest, Invitation, OpenInvitation, Page, PageQuery, Session } from '@masswright/contracts';
import {
  addToOutbox,
  Database,
  findInvitationByToken,
  findMember,
  findOpenInvitation,
  findOrganisationName,
  findUserByEmail,
  insertInvitation,
  insertMembership,
  insertUser,
  listInvitations,
  markInvitationAccepted,
  publishEvent,
  recordAudit,
  withdrawInvitations,
  type Transaction,
  type User,
} from '@masswright/drizzle';
import { deriveLinkToken, hashToken } from '@masswright/jobs';
import { requireManagePeople } from '../people/people.policy';
import { InjectApiSettings, type ApiSettings } from '../platform/api-settings';
import { AppError, notFound } from '../platform/app-error';
import { attemptLimits, AttemptLimits } from '../platform/attempt-limits';
import { decodeCursor, toPage } from '../platform/cursor';
import type { RequestContext, SignedInContext } from '../platform/request-context';
import { audit, Work, type Actor } from '../platform/work';
import { Passwords } from '../session/passwords';
import { SessionService } from '../session/session.service';
import { presentInvitation } from './invitations.presenter';

const daysOpen = 7;
const expired = () => new AppError('link-expired', 'This invitation no longer stands: it was used, withdrawn, or is more than seven days old. Ask for a new one.');

@Injectable()
export class InvitationsService {
  constructor(
    @Inject(Work) private readonly work: Work,
    @Inject(Database) private readonly database: Database,
    @Inject(Passwords) private readonly passwords: Passwords,
    @Inject(SessionService) private readonly sessions: SessionService,
    @Inject(AttemptLimits) private readonly attempts: AttemptLimits,
    @InjectApiSettings() private readonly settings: ApiSettings,
  ) {}

  list(context: SignedInContext, query: PageQuery): Promise<Page<Invitation>> {
    const after = decodeCursor(z.tuple([z.string(), z.uuid()]), query.after);
    return this.work.run(context, async (tx, actor) => {
      requireManagePeople(actor);
      const rows = await listInvitations(tx, { after: after === undefined ? undefined : { email: after[0], id: after[1] }, limit: query.limit + 1 });
      return toPage(rows, query.limit, presentInvitation, (row) => [row.email, row.id]);
    });
  }

  /** Inviting an address again replaces its open invitation: the older link stops working. */
  create(context: SignedInContext, { email, role }: CreateInvitationRequest): Promise<Invitation> {
    const { organisationId, userId, requestId } = context;
    const id = randomUUID();
    const create = async (tx: Transaction, actor: Actor) => {
      requireManagePeople(actor);
      const invited = await findUserByEmail(tx, email);
      if (invited !== undefined && (await findMember(tx, organisationId, invited.id)) !== undefined) {
        throw new AppError('conflict', 'This person is in the organisation already.', { fields: [{ path: 'email', message: 'This person is in the organisation already.' }] });
      }
      await withdrawInvitations(tx, { email });
      const tokenHash = hashToken(deriveLinkToken(this.settings.LINK_SECRET, 'invitation', id));
      await insertInvitation(tx, { id, organisationId, email, role, tokenHash, invitedBy: userId, expiresAt: new Date(Date.now() + daysOpen * 86_400_000) });
      await addToOutbox(tx, { organisationId, job: 'mail.send', payload: { mail: 'invitation', organisationId, invitationId: id }, requestId });
      await audit(tx, context, { action: 'invitation.create', subject: { type: 'invitation', id }, after: { email, role } });
      await publishEvent(tx, { organisationId, event: { type: 'people' } });
      const row = await findOpenInvitation(tx, id);
      if (row === undefined) throw new Error('An invitation vanished while it was made.');
      return presentInvitation(row);
    };
    return this.work.run(context, create, email);
  }

  withdraw(context: SignedInContext, invitationId: string): Promise<void> {
    return this.work.run(context, async (tx, actor) => {
      requireManagePeople(actor);
      const withdrawn = await withdrawInvitations(tx, { id: invitationId });
      if (withdrawn.length === 0) throw notFound('open invitation');
      await audit(tx, context, { action: 'invitation.withdraw', subject: { type: 'invitation', id: invitationId } });
      await publishEvent(tx, { organisationId: context.organisationId, event: { type: 'people' } });
    });
  }

  async lookUp(context: RequestContext, token: string): Promise<OpenInvitation> {
    await this.attempts.count(attemptLimits.linkFromAddress, context.address);
    const { invitation, organisationName, user } = await this.find(token);
    return { organisationName, email: invitation.email, role: invitation.role, hasAccount: user !== undefined };
  }

  /** The link proves the address. Who has an account proves that too, by its password; who hasn't, makes one. */
  async accept(context: RequestContext, request: AcceptInvitationRequest, response: Response): Promise<Session> {
    await this.attempts.count(attemptLimits.linkFromAddress, context.address);
    const { invitation, user: known } = await this.find(request.token);
    const { organisationId, email, role } = invitation;
    const user = await this.identify(email, known, request);
    await this.database.transaction({ organisationId, userId: user.id, email }, async (tx) => {
      if (!(await markInvitationAccepted(tx, invitation.id))) throw expired();
      if (known === undefined) await insertUser(tx, user);
      if ((await findMember(tx, organisationId, user.id)) === undefined) {
        await insertMembership(tx, { organisationId, userId: user.id, role });
      }
      await recordAudit(tx, {
        organisationId,
        actorId: user.id,
        action: 'invitation.accept',
        subject: { type: 'invitation', id: invitation.id },
        after: { role },
        requestId: context.requestId,
      });
      await publishEvent(tx, { organisationId, event: { type: 'people' } });
    });
    await this.attempts.forgive(attemptLimits.linkFromAddress, context.address);
    return this.sessions.beginFor(context, user, organisationId, response);
  }

  private async identify(email: string, known: User | undefined, request: AcceptInvitationRequest): Promise<User> {
    if (request.as === 'new-person') {
      if (known !== undefined) throw new AppError('conflict', 'This address has an account already: give its password instead of a new one.');
      return { id: randomUUID(), email, name: request.name, passwordHash: await this.passwords.hash(request.password) };
    }
    if (known === undefined) throw new AppError('conflict', 'This address has no account yet: give a name and a new password.');
    await this.attempts.count(attemptLimits.signInOfAccount, email);
    if (!(await this.passwords.verify(known.passwordHash, request.password))) {
      throw new AppError('forbidden', 'The password is wrong.', { fields: [{ path: 'password', message: 'The password is wrong.' }] });
    }
    await this.attempts.clear(attemptLimits.signInOfAccount, email);
    return known;
  }

  private async find(token: string) {
    const tokenHash = hashToken(token);
    const invitation = await this.database.transaction({ tokenHash }, (tx) => findInvitationByToken(tx, tokenHash));
    if (invitation === undefined) throw expired();
    const { organisationId, email } = invitation;
    return this.database.transaction({ organisationId, email }, async (tx) => {
      const organisationName = await findOrganisationName(tx, organisationId);
      if (organisationName === undefined) throw expired();
      return { invitation, organisationName, user: await findUserByEmail(tx, email) };
    });
  }
}

import { Inject, Injectable } from '@nestjs/common';
import {
  Database,
  findOpenInvitation,
  findOrganisationName,
  findPasswordReset,
  findUserByEmail,
  insertPasswordReset,
  recordAudit,
} from '@masswright/drizzle';
import { deriveLinkToken, hashToken, type JobPayload, type LinkKind } from '@masswright/jobs';
import type { Logger } from '@masswright/logs';
import { InjectLogger } from '../platform/inject-logger';
import { InjectWorkerSettings, type WorkerSettings } from '../platform/worker-settings';
import type { JobContext } from '../queue/job-handlers';
import { composeInvitation, composePasswordReset, type Mail } from './compose-mail';
import { Mailer } from './mailer';

type MailJob = JobPayload<'mail.send'>;
interface Letter {
  to: string;
  mail: Mail;
  reason: string;
}

const resetMinutes = 60;

/** The server's word that it will never take this mail (RFC 5321: replies of 5yz are permanent). */
function isRefusedForGood(error: unknown): boolean {
  return error instanceof Error && 'responseCode' in error && typeof error.responseCode === 'number' && error.responseCode >= 500;
}

/** Writes and sends a mail; one whose reason is gone meanwhile (withdrawn, used, expired) is not sent. */
@Injectable()
export class MailHandler {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(Mailer) private readonly mailer: Mailer,
    @InjectWorkerSettings() private readonly settings: WorkerSettings,
    @InjectLogger() private readonly logger: Logger,
  ) {}

  async handle(job: MailJob, context: JobContext): Promise<void> {
    const letter = job.mail === 'invitation' ? await this.writeInvitation(job) : await this.writePasswordReset(job, context);
    if (letter === undefined) return;
    try {
      await this.mailer.send(letter.to, letter.mail, letter.reason);
    } catch (error) {
      if (!isRefusedForGood(error)) throw error;
      this.logger.error({ err: error, requestId: context.requestId, outboxId: context.outboxId }, 'the mail server refused a mail for good; it is not tried again');
    }
  }

  private writeInvitation({ organisationId, invitationId }: Extract<MailJob, { mail: 'invitation' }>): Promise<Letter | undefined> {
    return this.database.transaction({ organisationId }, async (tx) => {
      const invitation = await findOpenInvitation(tx, invitationId);
      const organisationName = await findOrganisationName(tx, organisationId);
      if (invitation === undefined || organisationName === undefined || invitation.expiresAt.getTime() <= Date.now()) return undefined;
      const url = this.linkTo('invitation', invitationId);
      const mail = composeInvitation({ organisationName, invitedBy: invitation.invitedByName, role: invitation.role, url });
      return { to: invitation.email, mail, reason: `invitation-${invitationId}` };
    });
  }

  /** The request is looked into here, not in the api, so that its answer takes the same time whether or not there is an account. */
  private async writePasswordReset({ email, passwordResetId: id }: Extract<MailJob, { mail: 'password-reset' }>, { requestId }: JobContext): Promise<Letter | undefined> {
    const user = await this.database.transaction({ email }, (tx) => findUserByEmail(tx, email));
    if (user === undefined) return undefined;
    return this.database.transaction({ userId: user.id }, async (tx) => {
      const tokenHash = hashToken(deriveLinkToken(this.settings.LINK_SECRET, 'password-reset', id));
      const isNew = await insertPasswordReset(tx, { id, userId: user.id, tokenHash, expiresAt: new Date(Date.now() + resetMinutes * 60_000) });
      if (isNew) await recordAudit(tx, { organisationId: null, actorId: user.id, action: 'password-reset.request', subject: { type: 'user', id: user.id }, requestId });
      const reset = await findPasswordReset(tx, id);
      if (reset === undefined || reset.expiresAt.getTime() <= Date.now()) return undefined;
      return { to: user.email, mail: composePasswordReset({ name: user.name, url: this.linkTo('password-reset', id) }), reason: `password-reset-${id}` };
    });
  }

  /** The token stands after the #, so that no server and no log on the way ever sees it. */
  private linkTo(kind: LinkKind, id: string): string {
    const page = kind === 'invitation' ? 'invitation' : 'new-password';
    return `${this.settings.PUBLIC_URL}/${page}#token=${deriveLinkToken(this.settings.LINK_SECRET, kind, id)}`;
  }
}

import { Inject, Injectable } from '@nestjs/common';
import { Database, findOpenInvitation, findOrganisationName, findPasswordReset, findUser } from '@masswright/drizzle';
import { deriveLinkToken, type JobPayload, type LinkKind } from '@masswright/jobs';
import { InjectWorkerSettings, type WorkerSettings } from '../platform/worker-settings';
import type { JobContext } from '../queue/job-handlers';
import { composeInvitation, composePasswordReset, type Mail } from './compose-mail';
import { Mailer } from './mailer';

type MailJob = JobPayload<'mail.send'>;

/** Writes and sends a mail; one whose reason is gone meanwhile (withdrawn, used) is not sent. */
@Injectable()
export class MailHandler {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(Mailer) private readonly mailer: Mailer,
    @InjectWorkerSettings() private readonly settings: WorkerSettings,
  ) {}

  async handle(job: MailJob, context: JobContext): Promise<void> {
    const letter = job.mail === 'invitation' ? await this.writeInvitation(job) : await this.writePasswordReset(job);
    if (letter !== undefined) await this.mailer.send(letter.to, letter.mail, context.outboxId);
  }

  private writeInvitation({ organisationId, invitationId }: Extract<MailJob, { mail: 'invitation' }>): Promise<{ to: string; mail: Mail } | undefined> {
    return this.database.transaction({ organisationId }, async (tx) => {
      const invitation = await findOpenInvitation(tx, invitationId);
      const organisationName = await findOrganisationName(tx, organisationId);
      if (invitation === undefined || organisationName === undefined) return undefined;
      const url = this.linkTo('invitation', invitationId);
      return { to: invitation.email, mail: composeInvitation({ organisationName, invitedBy: invitation.invitedByName, role: invitation.role, url }) };
    });
  }

  private writePasswordReset({ userId, passwordResetId }: Extract<MailJob, { mail: 'password-reset' }>): Promise<{ to: string; mail: Mail } | undefined> {
    return this.database.transaction({ userId }, async (tx) => {
      const reset = await findPasswordReset(tx, passwordResetId);
      const user = await findUser(tx, userId);
      if (reset === undefined || user === undefined) return undefined;
      return { to: user.email, mail: composePasswordReset({ name: user.name, url: this.linkTo('password-reset', passwordResetId) }) };
    });
  }

  /** The token stands after the #, so that no server and no log on the way ever sees it. */
  private linkTo(kind: LinkKind, id: string): string {
    const page = kind === 'invitation' ? 'invitation' : 'new-password';
    return `${this.settings.PUBLIC_URL}/${page}#token=${deriveLinkToken(this.settings.LINK_SECRET, kind, id)}`;
  }
}

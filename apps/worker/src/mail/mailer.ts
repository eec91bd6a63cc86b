import { Injectable, type OnModuleDestroy } from '@nestjs/common';
import { createTransport, type Transporter } from 'nodemailer';
import { InjectWorkerSettings, type WorkerSettings } from '../platform/worker-settings';
import type { Mail } from './compose-mail';

/** Sends mail by SMTP. */
@Injectable()
export class Mailer implements OnModuleDestroy {
  private readonly transport: Transporter;

  constructor(@InjectWorkerSettings() private readonly settings: WorkerSettings) {
    this.transport = createTransport(settings.SMTP_URL, { from: settings.MAIL_FROM });
  }

  onModuleDestroy(): void {
    this.transport.close();
  }

  /**
   * `reason` names what the mail is about, such as an invitation by its id: should a mail be sent twice, both have the same
   * Message-ID and are the same message to whoever receives them.
   */
  async send(to: string, mail: Mail, reason: string): Promise<void> {
    const messageId = `<${reason}@${new URL(this.settings.PUBLIC_URL).hostname}>`;
    await this.transport.sendMail({ to, ...mail, messageId });
  }
}

import { randomUUID } from 'node:crypto';
import type { DataSource, EntityManager } from 'typeorm';
import type { Outbox } from '../../shared/contracts';
import type { Config } from '../config';
import { MessageEntity } from './message-entity';

export interface Letter {
  readonly teamId: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
}

/** Sends one message; rejects when the mail server does not take it. */
export type Carrier = (message: { to: string; subject: string; text: string }) => Promise<void>;

/** How often a message is tried before it is left alone in the outbox. */
const TRIES = 10;
const RETRY_MILLISECONDS = 60_000;

/** Loaded when the first message leaves, not at the start. */
export function smtpCarrier(smtpUrl: string, from: string): Carrier {
  let transport: Promise<{ sendMail(message: object): Promise<unknown> }> | null = null;
  return async (message) => {
    transport ??= import('nodemailer').then((nodemailer) => nodemailer.createTransport(smtpUrl));
    await (await transport).sendMail({ from, ...message });
  };
}

export const carrierFor = ({ smtpUrl, mailFrom }: Config): Carrier | null =>
  smtpUrl ? smtpCarrier(smtpUrl, mailFrom) : null;

/**
 * The way out for messages. They are stored in the transaction of what they tell of, and leave after it, so that
 * none goes out for an act that did not happen, and none is lost when the mail server is away.
 */
export class Post {
  private running: Promise<void> | null = null;
  private again = false;
  private timer: NodeJS.Timeout | null = null;

  constructor(
    private readonly db: DataSource,
    private readonly carrier: Carrier | null,
    private readonly clock: () => Date,
    private readonly report: (line: string, error?: unknown) => void,
  ) {}

  get mailServer(): boolean {
    return this.carrier !== null;
  }

  async queue(manager: EntityManager, letter: Letter): Promise<void> {
    await manager.insert(MessageEntity, {
      id: randomUUID(),
      teamId: letter.teamId,
      recipient: letter.to,
      subject: letter.subject,
      text: letter.text,
      at: this.clock(),
      sentAt: null,
      tries: 0,
    });
    this.again = true;
  }

  /** Sends what waits, if anything was queued since; does not wait for it. */
  kick(): void {
    if (!this.carrier || !this.again || this.running) return;
    this.again = false;
    this.running = this.sendAll(this.carrier)
      .catch((error: unknown) => this.report('Sending mail failed', error))
      .finally(() => {
        this.running = null;
      });
  }

  /** Also looks each minute: for messages of another process, and for those the mail server refused before. */
  start(): void {
    if (!this.carrier) return;
    this.again = true;
    this.kick();
    this.timer = setInterval(() => {
      this.again = true;
      this.kick();
    }, RETRY_MILLISECONDS).unref();
  }

  async stop(): Promise<void> {
    if (this.timer) clearInterval(this.timer);
    await this.running;
  }

  private async sendAll(carrier: Carrier): Promise<void> {
    const passed = new Set<string>();
    while (await this.sendNext(carrier, passed));
  }

  /** The row stays locked while its message is on the way, so that two processes never send the same one. */
  private sendNext(carrier: Carrier, passed: Set<string>): Promise<boolean> {
    return this.db.transaction(async (manager) => {
      const message = await manager
        .createQueryBuilder(MessageEntity, 'message')
        .where('message.sent_at is null and message.tries < :tries', { tries: TRIES })
        .andWhere('message.id <> all(:passed)', { passed: [...passed] })
        .orderBy('message.at')
        .setLock('pessimistic_write')
        .setOnLocked('skip_locked')
        .getOne();
      if (!message) return false;
      passed.add(message.id);
      try {
        await carrier({ to: message.recipient, subject: message.subject, text: message.text });
        await manager.update(MessageEntity, message.id, { sentAt: this.clock() });
      } catch (error) {
        this.report(`The mail server did not take a message to ${message.recipient}`, error);
        await manager.update(MessageEntity, message.id, { tries: message.tries + 1 });
      }
      return true;
    });
  }
}

/** The newest 200 messages of a team. */
export async function outbox(manager: EntityManager, teamId: string, mailServer: boolean): Promise<Outbox> {
  const rows = await manager.find(MessageEntity, { where: { teamId }, order: { at: 'DESC' }, take: 200 });
  return {
    mailServer,
    messages: rows.map((row) => ({
      id: row.id,
      to: row.recipient,
      subject: row.subject,
      text: row.text,
      at: row.at.toISOString(),
      sent: row.sentAt !== null,
    })),
  };
}

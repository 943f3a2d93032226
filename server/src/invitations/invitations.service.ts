import { Inject, Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import { createOpaqueToken, hashToken } from '../auth/opaque-token';
import { PasswordHasher } from '../auth/passwords/password-hasher';
import { assertGoodPassword } from '../auth/passwords/password-rules';
import { BenchService } from '../bench/bench.service';
import type { Actor } from '../common/actor';
import { AppError } from '../common/app-error';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { MailService } from '../mail/mail.service';
import { PeopleService } from '../people/people.service';
import type { Person } from '../people/person.entity';
import type {
  AcceptInvitationDto,
  CreateInvitationDto,
  InvitationDto,
  InvitationLookDto,
  MadeInvitationDto,
} from './dto/invitation.dto';
import { Invitation } from './invitation.entity';

const OPEN =
  'invitation.accepted_at IS NULL AND invitation.revoked_at IS NULL AND invitation.expires_at > now()';

/** Links by which somebody joins the bench: mailed or handed over, stored hashed, for one use. */
@Injectable()
export class InvitationsService {
  constructor(
    private readonly dataSource: DataSource,
    @Inject(ENV) private readonly env: Pick<Env, 'PUBLIC_URL' | 'INVITATION_HOURS'>,
    private readonly mail: MailService,
    private readonly people: PeopleService,
    private readonly bench: BenchService,
    private readonly hasher: PasswordHasher,
    private readonly audit: AuditService,
  ) {}

  async list(): Promise<InvitationDto[]> {
    const open = await this.#open().orderBy('invitation.created_at', 'DESC').getMany();
    return open.map(toInvitationDto);
  }

  /** @throws AppError EMAIL_TAKEN */
  async create(actor: Actor, { email, roles }: CreateInvitationDto): Promise<MadeInvitationDto> {
    if (email !== undefined && (await this.people.findByEmail(email))) throw new AppError('EMAIL_TAKEN');
    const token = createOpaqueToken();
    const link = `${this.env.PUBLIC_URL}/invitation#${token}`;
    const isMailed = email !== undefined && this.mail.canSend;
    const { name } = await this.bench.describe();
    const id = await this.dataSource.transaction(async (tx) => {
      const { identifiers } = await tx
        .createQueryBuilder()
        .insert()
        .into(Invitation)
        .values({
          tokenHash: hashToken(token),
          email: email ?? null,
          roles,
          invitedById: actor.person?.id,
          expiresAt: () => `now() + make_interval(hours => ${this.env.INVITATION_HOURS})`,
        })
        .execute();
      const made = (identifiers[0] as { id: string }).id;
      if (isMailed) {
        const text = [
          `${actor.person?.displayName ?? 'The administrator'} invites you to ${name} as ${roles.join(' and ')}.`,
          `This link makes your account; it works once, within ${this.env.INVITATION_HOURS} hours:`,
          link,
        ].join('\n\n');
        await this.mail.queue({ to: email, subject: `An invitation to ${oneLine(name)}`, text }, tx);
      }
      const detail = `${email ?? 'whoever has the link'}, as ${roles.join(', ')}`;
      await this.audit.record(
        actor,
        { action: 'invitation.made', subject: `invitation:${made}`, detail },
        tx,
      );
      return made;
    });
    const invitation = await this.#open().andWhere('invitation.id = :id', { id }).getOneOrFail();
    return { ...toInvitationDto(invitation), link, isMailed };
  }

  /** @throws AppError NOT_FOUND */
  async revoke(actor: Actor, id: string): Promise<void> {
    const { affected } = await this.dataSource
      .createQueryBuilder()
      .update(Invitation)
      .set({ revokedAt: () => 'now()' })
      .where('id = :id AND accepted_at IS NULL AND revoked_at IS NULL', { id })
      .execute();
    if (!affected) throw new AppError('NOT_FOUND');
    await this.audit.record(actor, { action: 'invitation.revoked', subject: `invitation:${id}` });
  }

  /** @throws AppError TOKEN_SPENT */
  async look(token: string): Promise<InvitationLookDto> {
    const { email, roles, invitedBy, expiresAt } = toInvitationDto(await this.#find(token));
    const { name } = await this.bench.describe();
    return { email, roles, invitedBy, benchName: name, expiresAt };
  }

  /**
   * Makes the account.
   *
   * @throws AppError TOKEN_SPENT; EMAIL_TAKEN; VALIDATION_FAILED for a bad password or an address other than the invited one
   */
  async accept(actor: Actor, { token, displayName, email, password }: AcceptInvitationDto): Promise<Person> {
    const invitation = await this.#find(token);
    const address = email ?? invitation.email;
    if (address === null) throw fieldFault('email', 'must be given');
    if (invitation.email !== null && invitation.email !== address) {
      throw fieldFault('email', 'must be the address that was invited');
    }
    const { name: benchName } = await this.bench.describe();
    assertGoodPassword(password, { email: address, displayName, benchName });
    const passwordHash = await this.hasher.hash(password);
    return this.dataSource.transaction(async (tx) => {
      // The update decides between requests that race: only one finds the invitation open.
      const { affected } = await tx
        .createQueryBuilder()
        .update(Invitation)
        .set({ acceptedAt: () => 'now()' })
        .where('id = :id AND accepted_at IS NULL AND revoked_at IS NULL AND expires_at > now()', {
          id: invitation.id,
        })
        .execute();
      if (!affected) throw new AppError('TOKEN_SPENT');
      const { roles } = invitation;
      const person = await this.people.create(tx, { displayName, email: address, passwordHash, roles });
      const detail = `as ${roles.join(', ')}`;
      await this.audit.record(
        actor,
        { action: 'invitation.accepted', subject: `person:${person.id}`, detail, person },
        tx,
      );
      return person;
    });
  }

  #open() {
    return this.dataSource
      .createQueryBuilder(Invitation, 'invitation')
      .innerJoinAndSelect('invitation.invitedBy', 'inviter')
      .where(OPEN);
  }

  async #find(token: string): Promise<Invitation> {
    const hash = hashToken(token);
    const invitation = await this.#open().andWhere('invitation.token_hash = :hash', { hash }).getOne();
    if (!invitation) throw new AppError('TOKEN_SPENT');
    return invitation;
  }
}

function fieldFault(field: string, fault: string): AppError {
  return new AppError('VALIDATION_FAILED', { fields: { [field]: [fault] } });
}

/** A bench may be called anything; a mail's subject is one line. */
function oneLine(text: string): string {
  return text.replaceAll(/\p{Cc}+/gu, ' ');
}

function toInvitationDto({ id, email, roles, invitedBy, createdAt, expiresAt }: Invitation): InvitationDto {
  return {
    id,
    email,
    roles,
    invitedBy: invitedBy.displayName,
    createdAt: createdAt.toISOString(),
    expiresAt: expiresAt.toISOString(),
  };
}

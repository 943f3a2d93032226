import { ApiToken } from '../auth/api-tokens/api-token.entity';
import { Attempt } from '../auth/attempts/attempt.entity';
import { PasswordReset } from '../auth/password-resets/password-reset.entity';
import { Session } from '../auth/sessions/session.entity';
import { AuditEntry } from '../audit/audit-entry.entity';
import { Bench } from '../bench/bench.entity';
import { Invitation } from '../invitations/invitation.entity';
import { MailMessage } from '../mail/mail-message.entity';
import { PersonRole } from '../people/person-role.entity';
import { Person } from '../people/person.entity';
import { archiveEntities } from './archive-entities';

/** Every entity of the server; migrations must describe exactly these. */
export const entities = [
  ...archiveEntities,
  ApiToken,
  Attempt,
  AuditEntry,
  Bench,
  Invitation,
  MailMessage,
  PasswordReset,
  Person,
  PersonRole,
  Session,
];

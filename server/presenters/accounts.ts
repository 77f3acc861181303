/** People and messages as the API shows them. */
import type {
  AuditEntry,
  Invitation,
  Me,
  Member,
  QueuedLetter,
  SinkMessage,
} from '@/shared/contracts/accounts';
import type { Person } from '../context';
import type { Invitation as InvitationRow, Membership } from '../models/accounts';
import type { AuditEntry as AuditRow, MailMessage, SinkLetter } from '../models/messages';

export const presentMe = ({ userId, email, name, preferences, memberships }: Person): Me => ({
  user: { id: userId, email, name },
  preferences,
  workspaces: memberships.map(({ workspaceId, workspaceName, role }) => ({
    id: workspaceId,
    name: workspaceName,
    role,
  })),
});

export const presentMember = ({ userId, user, role, createdAt }: Membership): Member => ({
  userId,
  name: user?.name ?? '',
  email: user?.email ?? '',
  role,
  joinedAt: createdAt.toISOString(),
});

export const presentInvitation = (row: InvitationRow): Invitation => ({
  id: row.id,
  email: row.email,
  role: row.role,
  invitedBy: row.invitedBy?.name ?? '',
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
});

export const presentSinkMessage = ({ id, recipient, subject, text, createdAt }: SinkLetter): SinkMessage => ({
  id,
  to: recipient,
  subject,
  text,
  sentAt: createdAt.toISOString(),
});

export const presentQueuedLetter = (row: MailMessage): QueuedLetter => ({
  id: row.id,
  to: row.recipient,
  subject: row.subject,
  state: row.state === 'failed' ? 'failed' : 'waiting',
  attempts: row.attempts,
  lastError: row.lastError ?? null,
  nextTryAt: row.state === 'failed' ? null : row.dueAt.toISOString(),
  writtenAt: row.createdAt.toISOString(),
});

export const presentAuditEntry = ({
  id,
  createdAt,
  actorId,
  actorName,
  action,
  subject,
  subjectId,
  address,
  detail,
}: AuditRow): AuditEntry => ({
  id,
  at: createdAt.toISOString(),
  actor: actorName,
  actorId,
  action,
  subject,
  subjectId: subjectId ?? null,
  address,
  detail,
});

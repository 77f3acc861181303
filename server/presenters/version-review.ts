/** What is said of a version, as the API shows it. */
import type { AuditEntry } from '@/shared/contracts/accounts';
import type { VersionComment } from '@/shared/contracts/version-reviews';
import { parameterAt } from '@/shared/parameters/parameter-list';
import type { AuditEntry as AuditRow } from '../models/messages';
import type { VersionComment as CommentRow } from '../models/version-comment';
import { presentAuditEntry } from './accounts';

export const presentComment = (row: CommentRow): VersionComment => ({
  id: row.id,
  text: row.text,
  path: row.path,
  label: row.path === null ? null : (parameterAt(row.path)?.label ?? row.path),
  createdAt: row.createdAt.toISOString(),
  createdBy: row.createdBy?.name ?? '',
  createdById: row.createdById,
});

/** Everybody who reads the version reads its history: from which address somebody came is for admins alone. */
export const presentHistoryEntry = (row: AuditRow): AuditEntry => ({
  ...presentAuditEntry(row),
  address: null,
});

/** The audit trail, newest first. */
import { keepPreviousData, useInfiniteQuery } from '@tanstack/react-query';
import type { AuditEntry, AuditFilter } from '@/shared/contracts/accounts';
import type { Page } from '@/shared/contracts/common';
import { api, downloadUrl } from './api';

export function useAudit(filter: AuditFilter) {
  return useInfiniteQuery({
    queryKey: ['audit', filter],
    queryFn: ({ pageParam, signal }) =>
      api<Page<AuditEntry>>('/audit', { query: { ...filter, cursor: pageParam, limit: 50 }, signal }),
    placeholderData: keepPreviousData,
    initialPageParam: '',
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  });
}

/** Address of all of it as a file. */
export const auditCsvUrl = (filter: AuditFilter): string => downloadUrl('/audit.csv', { ...filter });

/** The report of a version: as data for the page, and the address of its PDF. */
import { useQuery } from '@tanstack/react-query';
import type { Report } from '@/shared/contracts/report';
import { api, downloadUrl } from './api';
import { setKeys } from './parameter-sets';
import type { VersionRef } from './versions';

const path = ({ setId, number }: VersionRef) => `/parameter-sets/${setId}/versions/${number}`;

export const useReport = (of: VersionRef) =>
  useQuery({
    queryKey: [...setKeys.all, 'report', of.setId, of.number],
    queryFn: ({ signal }) => api<Report>(`${path(of)}/report`, { signal }),
  });

export const reportPdfUrl = (of: VersionRef): string => downloadUrl(`${path(of)}/report.pdf`);

/** One version of a set: its way through the review, what is said of it, and its files for download. */
import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { AuditEntry } from '@/shared/contracts/accounts';
import type { Page } from '@/shared/contracts/common';
import type { ExportFormat } from '@/shared/contracts/exports';
import type {
  ParameterSetDetail,
  ParameterSetPatch,
  ParameterSetVersion,
  ReviewReleaseInput,
  ReviewReturn,
  VersionPatch,
} from '@/shared/contracts/parameter-sets';
import type { CommentCreate, VersionComment } from '@/shared/contracts/version-reviews';
import { api, downloadUrl } from './api';
import { setKeys } from './parameter-sets';

/** Which version of which set. */
export interface VersionRef {
  setId: string;
  number: number;
}

const path = ({ setId, number }: VersionRef) => `/parameter-sets/${setId}/versions/${number}`;

export const versionKeys = {
  comments: ({ setId, number }: VersionRef) => ['parameter-sets', 'comments', setId, number] as const,
  history: ({ setId, number }: VersionRef) => ['parameter-sets', 'history', setId, number] as const,
};

/** Oldest first. */
export const useComments = (of: VersionRef) =>
  useQuery(
    queryOptions({
      queryKey: versionKeys.comments(of),
      queryFn: ({ signal }) => api<Page<VersionComment>>(`${path(of)}/comments`, { signal }),
    }),
  );

/** Oldest first. */
export const useVersionHistory = (of: VersionRef) =>
  useQuery(
    queryOptions({
      queryKey: versionKeys.history(of),
      queryFn: ({ signal }) => api<Page<AuditEntry>>(`${path(of)}/history`, { signal }),
    }),
  );

/** A request about a version; all that is known of sets is asked for again after it. */
function useVersionAction<I, O>(request: (input: I) => Promise<O>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: request,
    // Also after a refusal: somebody else may have been quicker.
    onSettled: () => client.invalidateQueries({ queryKey: setKeys.all }),
  });
}

const send = <O>(to: string, body?: unknown, method: 'POST' | 'PATCH' | 'DELETE' = 'POST') =>
  api<O>(to, { method, ...(body === undefined ? {} : { body }) });

export const useSubmitVersion = (of: VersionRef) =>
  useVersionAction<void, ParameterSetVersion>(() => send(`${path(of)}/submit`));
export const useReturnVersion = (of: VersionRef) =>
  useVersionAction<ReviewReturn, ParameterSetVersion>((body) => send(`${path(of)}/return`, body));
export const useReleaseVersion = (of: VersionRef) =>
  useVersionAction<ReviewReleaseInput, ParameterSetVersion>((body) => send(`${path(of)}/release`, body));
/** A new draft that begins as a copy. */
export const useReviseVersion = (of: VersionRef) =>
  useVersionAction<void, ParameterSetVersion>(() => send(`${path(of)}/revise`, {}));
export const usePatchVersion = (of: VersionRef) =>
  useVersionAction<VersionPatch, ParameterSetVersion>((body) => send(path(of), body, 'PATCH'));
export const useDiscardVersion = (of: VersionRef) =>
  useVersionAction<void, void>(() => send(path(of), undefined, 'DELETE'));
export const usePatchSet = (setId: string) =>
  useVersionAction<ParameterSetPatch, ParameterSetDetail>((body) =>
    send(`/parameter-sets/${setId}`, body, 'PATCH'),
  );
export const useAddComment = (of: VersionRef) =>
  useVersionAction<CommentCreate, VersionComment>((body) => send(`${path(of)}/comments`, body));

/** Address of the version as a file. */
export const exportUrl = (of: VersionRef, format: ExportFormat): string =>
  downloadUrl(`${path(of)}/export`, { format });

/** Address of what is released for a vehicle. */
export const releasedSetUrl = (vehicleId: string, format: ExportFormat): string =>
  downloadUrl(`/vehicles/${vehicleId}/released-set`, { format });

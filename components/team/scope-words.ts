import type { TokenScope } from '@/shared/contracts/roles';

/** In a word or two; a sentence on each is in the contract. */
export const SCOPE_LABELS: Record<TokenScope, string> = {
  'released-set:read': 'Released sets',
  'export:read': 'All exports',
  'workspace:read': 'Read everything',
  'recording:write': 'Upload',
  'run:create': 'Run',
};

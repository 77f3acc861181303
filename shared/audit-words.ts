/** What the audit trail's actions are called. Pure. */

const WORDS: Record<string, string> = {
  'invitation.sent': 'Invitation sent',
  'invitation.withdrawn': 'Invitation withdrawn',
  'mail.tried-again': 'Letters tried again',
  'map-template.created': 'Channel map kept as template',
  'map-template.deleted': 'Channel map template deleted',
  'member.joined': 'Member joined',
  'member.left': 'Member left',
  'member.removed': 'Member removed',
  'member.role-changed': 'Role changed',
  'recording.changed': 'Recording changed',
  'recording.deleted': 'Recording deleted',
  'recording.mapped': 'Recording mapped',
  'recording.remedied': 'Remedy accepted',
  'recording.remedy-undone': 'Remedy taken back',
  'recording.simulated': 'Recording simulated',
  'recording.stopped': 'Decoding stopped',
  'recording.uploaded': 'Recording uploaded',
  'requirement.changed': 'Requirement changed',
  'requirement.created': 'Requirement added',
  'requirement.deleted': 'Requirement deleted',
  'set.changed': 'Set changed',
  'set.deleted': 'Set deleted',
  'set.version-created': 'Version saved',
  'token.created': 'API token made',
  'token.revoked': 'API token revoked',
  'vehicle.changed': 'Vehicle changed',
  'vehicle.created': 'Vehicle added',
  'vehicle.deleted': 'Vehicle deleted',
  'version.cell-waived': 'Cell waived',
  'version.changed': 'Draft changed',
  'version.commented': 'Comment written',
  'version.discarded': 'Draft discarded',
  'version.released': 'Released',
  'version.returned': 'Returned',
  'version.submitted': 'Submitted for review',
  'version.superseded': 'Superseded',
  'version.verification-started': 'Verification started',
  'workspace.created': 'Workspace made',
  'workspace.deleted': 'Workspace deleted',
  'workspace.exported': 'All data exported',
};

/** An action without words of its own is told by its name. */
export const actionWords = (action: string): string =>
  WORDS[action] ?? action.replaceAll(/[.-]/g, ' ').replace(/^./, (first) => first.toUpperCase());

/** Every action that has words, for a choice. */
export const AUDIT_ACTIONS: readonly string[] = Object.keys(WORDS);

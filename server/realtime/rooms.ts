/** Names of the rooms. */
export const rooms = {
  run: (runId: string) => `run:${runId}`,
  workspace: (workspaceId: string) => `workspace:${workspaceId}`,
  session: (sid: string) => `session:${sid}`,
  bench: (workspaceId: string, recordingId: string) => `bench:${workspaceId}:${recordingId}`,
  user: (userId: string) => `user:${userId}`,
};

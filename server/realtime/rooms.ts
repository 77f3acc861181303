/** Names of the rooms. */
export const rooms = {
  run: (runId: string) => `run:${runId}`,
  workspace: (workspaceId: string) => `workspace:${workspaceId}`,
  session: (sid: string) => `session:${sid}`,
  user: (userId: string) => `user:${userId}`,
};

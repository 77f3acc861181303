import type { Health } from '@/shared/contracts/common';
import type { Context } from '../context';
import { VERSION } from '../version';

/** Asks the database and the queue; never fails itself. */
export async function checkHealth(ctx: Context): Promise<Health> {
  const [database, queue] = await Promise.all([
    ctx.db.sequelize.query('SELECT 1').then(
      () => 'up' as const,
      () => 'down' as const,
    ),
    ctx.queue.isUp().then((up) => (up ? ('up' as const) : ('down' as const))),
  ]);
  return {
    status: database === 'up' && queue === 'up' ? 'ok' : 'degraded',
    version: VERSION,
    database,
    queue,
  };
}

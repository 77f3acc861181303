import { pino } from 'pino';
import { ConnectionRefusedError, DatabaseError, UniqueConstraintError } from 'sequelize';
import { isDatabaseAway, persist } from '@/server/database-state';

const driver = (code: string, message = 'x') => Object.assign(new Error(message), { code, sql: '' });

describe('telling that the database is away', () => {
  it.each([
    ['a refused connection', new ConnectionRefusedError(driver('ECONNREFUSED'))],
    ['a server that shuts down', new DatabaseError(driver('57P01'))],
    ['a server that starts up', driver('57P03')],
    ['a lost socket', driver('ECONNRESET')],
    ['a connection cut in a query', new Error('Connection terminated unexpectedly')],
    ['an error of another realm', { code: 'ECONNREFUSED', message: 'x' }],
  ])('%s', (_what, error) => expect(isDatabaseAway(error)).toBe(true));

  it.each([
    ['a broken constraint', new UniqueConstraintError({})],
    ['a wrong statement', new DatabaseError(driver('42601'))],
    ['a fault of ours', new TypeError('x is not a function')],
    ['nothing', undefined],
  ])('but not for %s', (_what, error) => expect(isDatabaseAway(error)).toBe(false));
});

describe('persisting', () => {
  const log = pino({ level: 'silent' });
  const away = driver('57P01');

  it('repeats until the database lets it through', async () => {
    let tries = 0;
    const work = async () => {
      tries += 1;
      if (tries < 3) throw away;
      return 'written';
    };
    expect(await persist(work, { log, stopping: new AbortController().signal })).toBe('written');
    expect(tries).toBe(3);
  });

  it('throws any other failure at once, and gives up when the server stops', async () => {
    const options = { log, stopping: new AbortController().signal };
    await expect(persist(() => Promise.reject(new TypeError('x')), options)).rejects.toThrow(TypeError);
    await expect(persist(() => Promise.reject(away), { log, stopping: AbortSignal.abort() })).rejects.toBe(
      away,
    );
  });
});

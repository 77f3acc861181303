/** Before each browser test file: patience, and a picture of every window after each step. */
import path from 'node:path';
import { pictureAll } from './browser';

/** A step waits for real work: a database, decoding, a whole run. */
jest.setTimeout(300_000);

let step = 0;
afterEach(async () => {
  const { currentTestName = '', testPath = '' } = expect.getState();
  const name = currentTestName
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .slice(0, 80);
  await pictureAll(path.basename(testPath, '.test.ts'), `${String(++step).padStart(2, '0')}-${name}`);
});

/** A process of its own that puts without end until it is killed; says so on stdout once bytes are on disk. */
import { Readable } from 'node:stream';
import { FolderStore } from '@/workers/store/folder';

const endless = async function* () {
  for (let i = 0; ; i += 1) {
    yield Buffer.alloc(64 * 1024, i % 251);
    if (i === 20) process.stdout.write('writing\n');
    await new Promise((resolve) => setImmediate(resolve));
    if (i > 2000) await new Promise(() => setInterval(() => undefined, 1000));
  }
};
void new FolderStore(process.argv[2]!).put('runs/killed', Readable.from(endless(), { objectMode: false }));

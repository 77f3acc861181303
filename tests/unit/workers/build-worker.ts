/** Builds the worker's bundle in a process of its own: esbuild does not run inside Jest's sandbox. */
import { buildWorker } from '@/scripts/build/server-bundle';

void buildWorker(process.argv[2]!);

/** Runs the engine's figures as production runs the engine: one bundle, plain Node. */
import { runBundled } from '@/tests/support/bundled';

export function benchEngine(): void {
  runBundled('tests/bench/engine-figures.ts', [], { nodeOptions: ['--expose-gc'] });
}

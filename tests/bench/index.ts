/** npm run bench: the engine alone, then the whole stack. `npm run bench -- stack` (or engine) runs one of them. */
import { failWith } from '@/scripts/lib/project';
import { benchEngine } from './engine';
import { benchStack } from './stack';

const BENCHES: Record<string, () => void | Promise<void>> = { engine: benchEngine, stack: benchStack };

async function main(names: string[]): Promise<void> {
  for (const name of names.length > 0 ? names : Object.keys(BENCHES)) {
    const bench = BENCHES[name];
    if (!bench) throw new Error(`There is no bench "${name}". Benches: ${Object.keys(BENCHES).join(', ')}.`);
    await bench();
  }
}

main(process.argv.slice(2)).catch(failWith);

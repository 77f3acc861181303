/**
 * npm run bench: the engine alone, then the whole stack. `npm run bench -- NAME [arguments]` runs one of the benches below;
 * several may be named one after the other.
 */
import { failWith } from '@/scripts/lib/project';
import { runBundled } from '@/tests/support/bundled';
import { benchCharts } from './charts';
import { benchEngine } from './engine';
import { benchHealth } from './health';
import { benchIngest } from './ingest';
import { benchSearch } from './search';
import { benchStack } from './stack';
import { benchVerification } from './verification';

const script = (file: string) => (args: string[]) => void runBundled(`tests/bench/${file}.ts`, args);
const count = (args: string[]) => (args[0] === undefined ? undefined : Number(args[0]));

/** In the order of their arguments: megabytes; runs and part of a title; hours; seeds; seeds; seeds. */
const BENCHES: Record<string, (args: string[]) => void | Promise<void>> = {
  engine: benchEngine,
  stack: benchStack,
  ingest: (args) => benchIngest(count(args)),
  closure: script('closure'),
  'monte-carlo': script('monte-carlo'),
  allan: script('allan'),
  robustness: script('robustness'),
  memory: script('memory'),
  search: (args) => benchSearch(count(args)),
  health: (args) => benchHealth(count(args)),
  charts: benchCharts,
  verification: benchVerification,
};
const BY_DEFAULT = ['engine', 'stack'];

async function main(words: string[]): Promise<void> {
  const calls: { name: string; args: string[] }[] =
    words.length > 0 ? [] : BY_DEFAULT.map((name) => ({ name, args: [] }));
  for (const word of words) {
    const last = calls.at(-1);
    if (Object.hasOwn(BENCHES, word)) calls.push({ name: word, args: [] });
    else if (last !== undefined) last.args.push(word);
    else throw new Error(`There is no bench "${word}". Benches: ${Object.keys(BENCHES).join(', ')}.`);
  }
  for (const { name, args } of calls) await BENCHES[name]!(args);
}

main(process.argv.slice(2)).catch(failWith);

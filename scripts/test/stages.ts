/** The stages of npm test, each a command with a count. */
import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { writeRouteTypes } from '../build/client-export';
import { findChromium } from '../lib/chromium';
import { inRoot, ROOT } from '../lib/project';

export interface Count {
  passed: number;
  failed: number;
}

export interface Stage {
  name: string;
  run(context: StageContext): Promise<Count>;
}

export interface StageContext {
  /** For reports; removed at the end. */
  folder: string;
  stopping: AbortSignal;
}

/** What jest writes with --json, as far as it is read here. */
interface JestReport {
  numPassedTests: number;
  numFailedTests: number;
  /** Files that could not even be loaded: none of their tests is counted by jest. */
  numRuntimeErrorTestSuites: number;
}

const bin = (file: string) => inRoot('node_modules', file);

export const STAGES: Stage[] = [
  {
    name: 'types',
    run: async (context) => {
      await writeRouteTypes();
      return single(context, [bin('typescript/bin/tsc'), '--noEmit']);
    },
  },
  {
    name: 'lint',
    run: (context) => single(context, [bin('eslint/bin/eslint.js'), '.', '--max-warnings', '0']),
  },
  {
    name: 'format',
    run: (context) =>
      single(context, [bin('prettier/bin/prettier.cjs'), '--check', '--log-level', 'warn', '.']),
  },
  { name: 'unit', run: (context) => jest(context, 'unit', ['ui', 'node'], []) },
  { name: 'api', run: (context) => jest(context, 'api', ['api'], []) },
  {
    name: 'browser',
    run: async (context) => {
      findChromium(console.log);
      return jest(context, 'browser', ['e2e'], ['--runInBand']);
    },
  },
];

/** A command that is one check as a whole. */
async function single(context: StageContext, words: string[]): Promise<Count> {
  const ok = (await node(context, words)) === 0;
  return { passed: ok ? 1 : 0, failed: ok ? 0 : 1 };
}

async function jest(
  context: StageContext,
  name: string,
  projects: string[],
  options: string[],
): Promise<Count> {
  const report = path.join(context.folder, `${name}.json`);
  const status = await node(context, [
    ...[bin('jest/bin/jest.js'), '--ci', '--json', `--outputFile=${report}`, '--reporters=default'],
    ...['--selectProjects', ...projects, ...options],
  ]);
  if (!existsSync(report)) return { passed: 0, failed: 1 };
  const result = JSON.parse(readFileSync(report, 'utf8')) as JestReport;
  const failed = result.numFailedTests + result.numRuntimeErrorTestSuites;
  // Jest can also fail as a whole, by its set-up or tear-down.
  return { passed: result.numPassedTests, failed: status === 0 ? failed : Math.max(failed, 1) };
}

/** Runs Node with these words, its output on ours (errors and reports alike), and answers the exit status. */
function node({ stopping }: StageContext, words: string[]): Promise<number> {
  if (stopping.aborted) return Promise.resolve(130);
  const child: ChildProcess = spawn(process.execPath, words, {
    cwd: ROOT,
    // Jest repeats its report as JSON on stdout; people read what it writes to stderr.
    stdio: ['ignore', words.includes('--json') ? 'ignore' : 'inherit', 'inherit'],
  });
  const stop = () => child.kill('SIGTERM');
  stopping.addEventListener('abort', stop);
  return new Promise((resolve) => {
    child.once('error', () => resolve(127));
    child.once('exit', (code) => {
      stopping.removeEventListener('abort', stop);
      resolve(code ?? 130);
    });
  });
}

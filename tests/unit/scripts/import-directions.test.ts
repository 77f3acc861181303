import path from 'node:path';
import { ESLint, Linter } from 'eslint';
import * as parser from '@typescript-eslint/parser';
import importDirections from '@/scripts/lint/import-directions';

const root = path.resolve(__dirname, '../../..');

function complaints(file: string, code: string): string[] {
  const linter = new Linter({ cwd: root });
  const config: Linter.Config = {
    files: ['**/*.ts', '**/*.tsx'],
    languageOptions: { parser },
    plugins: { driftwright: { rules: { 'import-directions': importDirections } } },
    rules: { 'driftwright/import-directions': 'error' },
  };
  return linter.verify(code, config, { filename: path.join(root, file) }).map(({ message }) => message);
}

describe('imports that go the right way', () => {
  test.each([
    ['app/sign-in.tsx', `import { Screen } from '@/components/layout/Screen';`],
    ['app/sign-in.tsx', `import { useMe } from '../hooks/session';`],
    ['components/bench/Bench.tsx', `import { useRuns } from '@/hooks/runs';`],
    ['components/bench/Bench.tsx', `import { Text } from '../ui/Text';`],
    ['hooks/runs.ts', `import { runSchema } from '@/shared/contracts/runs';`],
    ['server/services/runs.ts', `import { startPool } from '@/workers/index';`],
    ['server/services/runs.ts', `import { startPool } from '@/workers';`],
    ['server/services/runs.ts', `import type { Pool } from '@/workers/protocol';`],
    ['server/services/runs.ts', `import { storeKeys } from '@/workers/store/types';`],
    ['server/demo/seed.ts', `import { demo } from '@/fixtures/demo';`],
    ['workers/jobs/run.ts', `import { createRun } from '../engine/run';`],
    ['workers/pool.ts', `import { fork } from 'node:child_process';`],
    ['workers/engine/filter/update.ts', `import { Matrix } from 'ml-matrix';`],
    ['workers/engine/filter/update.ts', `import { wrapAngle } from '../geodesy';`],
    ['tests/api/runs.test.ts', `import { startPool } from '@/workers/pool';`],
    ['scripts/start.ts', `import { readConfig } from '@/server/config';`],
  ])('%s: %s', (file, code) => {
    expect(complaints(file, code)).toEqual([]);
  });
});

describe('imports that go the wrong way', () => {
  test.each([
    ['app/sign-in.tsx', `import { signIn } from '@/server/services/sessions';`],
    ['app/sign-in.tsx', `import express from 'express';`],
    ['components/bench/Bench.tsx', `import Route from '@/app/index';`],
    ['components/bench/Bench.tsx', `import { run } from '../../workers/engine/run';`],
    ['hooks/runs.ts', `import { Button } from '@/components/ui/Button';`],
    ['hooks/runs.ts', `import type { Pool } from '@/workers/protocol';`],
    ['constants/theme.ts', `import { useTheme } from '@/hooks/theme';`],
    ['server/services/runs.ts', `import { createRun } from '@/workers/engine/run';`],
    ['server/services/runs.ts', `import { decode } from '../../workers/jobs/decode';`],
    ['server/services/runs.ts', `import { View } from 'react-native';`],
    ['workers/jobs/run.ts', `import { Run } from '@/server/models/run';`],
    ['workers/jobs/run.ts', `import { Client } from 'pg';`],
    ['workers/engine/filter/update.ts', `import { readFile } from 'node:fs/promises';`],
    ['workers/engine/filter/update.ts', `import type { RunJob } from '../../protocol';`],
    ['shared/units.ts', `import { palette } from '@/constants/theme';`],
    ['shared/units.ts', `export * from '../workers/protocol';`],
    ['hooks/runs.ts', `const later = () => import('@/server/index');`],
    ['hooks/runs.ts', `const now = require('../server/index');`],
    ['hooks/runs.ts', `type Row = import('@/server/models/run').Run;`],
  ])('%s: %s', (file, code) => {
    expect(complaints(file, code)).toHaveLength(1);
  });

  test('the message names the import and says what to do instead', () => {
    const [message] = complaints('hooks/runs.ts', `import { Button } from '@/components/ui/Button';`);
    expect(message).toContain('"@/components/ui/Button"');
    expect(message).toContain('move what is drawn to components/');
  });
});

test('the rule is an error for every file of the project', async () => {
  const baseConfig = jest.requireActual<Linter.Config[]>('@/eslint.config.js');
  const eslint = new ESLint({ cwd: root, overrideConfigFile: true, baseConfig });
  for (const file of ['shared/units.ts', 'workers/protocol.ts', 'constants/theme.ts']) {
    const config = (await eslint.calculateConfigForFile(path.join(root, file))) as Linter.Config;
    expect(config.rules?.['driftwright/import-directions']).toEqual([2]);
  }
});

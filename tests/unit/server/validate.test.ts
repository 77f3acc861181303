import { z } from 'zod';
import { ProblemError } from '@/server/errors';
import { validate } from '@/server/middleware/validate';

const schema = z.object({
  name: z.string().trim(),
  at: z.object({ x: z.number().default(0) }).prefault({}),
  windows: z.array(z.object({ from: z.number(), to: z.number().optional() })).default([]),
  loose: z.record(z.string(), z.unknown()).optional(),
});

const faults = (value: unknown) => {
  try {
    validate(schema, value, 'body');
  } catch (error) {
    if (error instanceof ProblemError) return error.extra.errors?.map((fault) => fault.path);
    throw error;
  }
  return [];
};

describe('validation', () => {
  it('answers the parsed value, defaults filled in', () => {
    expect(validate(schema, { name: ' a ' }, 'body')).toEqual({ name: 'a', at: { x: 0 }, windows: [] });
  });

  it('names every fault by its dotted path', () => {
    const value = { name: 1, at: { x: 'far' }, windows: [{ from: 0 }, { from: 'now' }] };
    expect(faults(value)).toEqual(['name', 'at.x', 'windows.1.from']);
  });

  it('refuses what it does not know, however deep, and lets free records be', () => {
    expect(faults({ name: 'a', colour: 1, at: { y: 1 }, windows: [{ from: 0, till: 1 }] })).toEqual([
      'colour',
      'at.y',
      'windows.0.till',
    ]);
    expect(faults({ name: 'a', loose: { anything: { goes: 1 } } })).toEqual([]);
  });

  it('takes no body at all for an empty one', () => {
    expect(faults(undefined)).toEqual(['name']);
  });

  it('is not led astray by names that every object has', () => {
    expect(faults(JSON.parse('{"name":"a","toString":1,"constructor":2}'))).toEqual([
      'toString',
      'constructor',
    ]);
  });
});

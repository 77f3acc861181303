/** What the contract says of each parameter: its leaves, their kinds and bounds. Pure. */
import { z } from 'zod';
import { parametersSchema } from '@/shared/contracts/parameters';

export type LeafKind = 'switch' | 'number' | 'choice' | 'vector';

export interface ParameterLeaf {
  path: string;
  kind: LeafKind;
  /** Bounds of a number, SI; ±∞ where the contract sets none. */
  low: number;
  high: number;
  /** May be left out. */
  optional: boolean;
  /** Values of a choice. */
  options: readonly string[];
}

/** Every leaf of the parameters' contract, nested ones by their dotted path, set by default or not. */
export function parameterLeaves(): readonly ParameterLeaf[] {
  return LEAVES;
}

/** The leaf at `path`. Throws where the contract has none: a path in a table is then mistyped. */
export function leafAt(path: string): ParameterLeaf {
  const leaf = LEAVES.find((one) => one.path === path);
  if (!leaf) throw new Error(`The parameters have no ${path}.`);
  return leaf;
}

function leavesOf(schema: unknown, path: string, optional: boolean): ParameterLeaf[] {
  if (schema instanceof z.ZodOptional) return leavesOf(schema.unwrap(), path, true);
  if (schema instanceof z.ZodDefault || schema instanceof z.ZodPrefault)
    return leavesOf(schema.unwrap(), path, optional);
  if (schema instanceof z.ZodObject)
    return Object.entries(schema.shape).flatMap(([key, inner]) =>
      leavesOf(inner, path === '' ? key : `${path}.${key}`, optional),
    );
  const leaf = { path, low: -Infinity, high: Infinity, optional, options: [] };
  if (schema instanceof z.ZodNumber)
    return [
      { ...leaf, kind: 'number', low: schema.minValue ?? -Infinity, high: schema.maxValue ?? Infinity },
    ];
  if (schema instanceof z.ZodEnum) return [{ ...leaf, kind: 'choice', options: schema.options.map(String) }];
  return [{ ...leaf, kind: schema instanceof z.ZodBoolean ? 'switch' : 'vector' }];
}

const LEAVES = leavesOf(parametersSchema, '', false);

/** Small pieces that several routes share. */
import { z } from 'zod';
import { idSchema } from '@/shared/contracts/common';
import type { Request } from 'express';
import type { Config } from '../config';

export const idParams = z.object({ id: idSchema });
/** A version by its set and number. */
export const versionParams = z.object({ id: idSchema, n: z.coerce.number().int().positive() });

/** The address under which the caller reached this server, for links in letters. */
export const baseUrl = (config: Config, req: Request): string =>
  config.publicUrl ?? `${req.protocol}://${req.get('Host') ?? `${config.host}:${config.port}`}`;

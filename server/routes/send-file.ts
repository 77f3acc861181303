/** Answers a file as a stream: a slow reader holds up nobody, and memory stays flat. */
import type { Response } from 'express';
import { pipeline } from 'node:stream/promises';
import type { Download } from '../services/runs';
import { SENT } from './route';

export async function sendFile(res: Response, type: string, { stream, bytes, fileName }: Download) {
  res.setHeader('Content-Length', bytes);
  res.attachment(fileName);
  res.setHeader('Content-Type', type); // after the name, whose ending would choose another
  await pipeline(stream, res);
  return SENT;
}

/** Turns every failure into application/problem+json; what nobody foresaw is logged and answered as a bare 500. */
import type { ErrorRequestHandler, RequestHandler, Response } from 'express';
import { MulterError } from 'multer';
import type { Problem } from '@/shared/contracts/common';
import { JobCancelled, JobFailed, StoreFailed, StoreKeyMissing, WorkerCrashed } from '@/workers';
import { isDatabaseAway } from '../database-state';
import { codeOf } from '../error-details';
import { badRequest, conflict, noSpace, notFound, ProblemError, tooLarge, unavailable } from '../errors';

/** For a path that no route has. */
export const noRoute: RequestHandler = (req) => {
  throw notFound(`Nothing answers ${req.method} ${req.path}. The routes are listed in /api/v1/openapi.json.`);
};

export const answerProblems: ErrorRequestHandler = (error: unknown, req, res, next) => {
  if (res.headersSent) {
    req.log.warn({ err: error }, 'failed after the answer had begun');
    req.socket.destroy();
    next();
    return;
  }
  const known = identify(error);
  if (!known) req.log.error({ err: error }, 'unexpected failure');
  if (known?.status === 401 && req.get('Authorization')) res.setHeader('WWW-Authenticate', 'Bearer');
  send(res, known ?? UNEXPECTED, req.originalUrl);
};

const UNEXPECTED = new ProblemError(
  500,
  'unexpected',
  'Something went wrong on the server',
  'The request failed for a reason that was not foreseen; it has been logged. Try again, or tell the operator.',
);

function send(res: Response, error: ProblemError, instance: string): void {
  const body: Problem = {
    type: `urn:driftwright:problem:${error.code}`,
    title: error.title,
    status: error.status,
    detail: error.message,
    instance: instance.split('?')[0],
    ...(error.extra.errors ? { errors: error.extra.errors } : {}),
  };
  if (error.extra.retryAfterS !== undefined) res.setHeader('Retry-After', String(error.extra.retryAfterS));
  res.setHeader('Cache-Control', 'no-store');
  res.status(error.status).type('application/problem+json').send(JSON.stringify(body));
}

/** The problem that `error` stands for; null when nobody foresaw it. */
export function identify(error: unknown): ProblemError | null {
  if (error instanceof ProblemError) return error;
  if (isDatabaseAway(error)) {
    const detail = 'The database does not answer just now. Nothing was changed; try again in a moment.';
    return unavailable(detail, { retryAfterS: 2 });
  }
  if (error instanceof StoreFailed)
    return isFull(error) ? noSpace(error.message) : unavailable(error.message);
  if (error instanceof StoreKeyMissing) return notFound('This file is no longer kept.');
  if (error instanceof MulterError) return fromUpload(error);
  if (error instanceof JobFailed) return conflict(error.message);
  if (error instanceof WorkerCrashed) return unavailable(`${error.message} Try again.`, { retryAfterS: 1 });
  if (error instanceof JobCancelled) return unavailable('The server is stopping. Try again in a moment.');
  return fromBodyParser(error);
}

export const isFull = (error: unknown): boolean => ['ENOSPC', 'EDQUOT'].includes(codeOf(error) ?? '');

function fromUpload(error: MulterError): ProblemError {
  switch (error.code) {
    case 'LIMIT_FILE_SIZE':
      return tooLarge(`The file in the part “${error.field}” is larger than this server takes.`);
    case 'LIMIT_UNEXPECTED_FILE':
      return badRequest(
        `The part “${error.field}” is not expected. Send one file each as imu, gnss and, if there is one, reference.`,
      );
    default:
      return badRequest(`The multipart body cannot be used: ${error.message}.`);
  }
}

/** Express' body parser throws plain errors that carry a status and a type. */
function fromBodyParser(error: unknown): ProblemError | null {
  if (!(error instanceof Error) || !('type' in error)) return null;
  switch (error.type) {
    case 'entity.parse.failed':
      return badRequest(`The body is not valid JSON: ${error.message}.`);
    case 'entity.too.large':
      return tooLarge('The JSON body is larger than 4 MB.');
    case 'request.aborted':
    case 'request.size.invalid':
    case 'encoding.unsupported':
    case 'charset.unsupported':
      return badRequest(`The body cannot be read: ${error.message}.`);
    default:
      return null;
  }
}

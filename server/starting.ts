/** What is answered between listening and being ready, while migrations and the demo's seed run. */
import type { RequestListener } from 'node:http';
import type { Problem } from '@/shared/contracts/common';

const PROBLEM: Problem = {
  type: 'urn:driftwright:problem:unavailable',
  title: 'Not available just now',
  status: 503,
  detail: 'The server is starting. Try again in a moment.',
};

export const answerStarting: RequestListener = (_req, res) => {
  res.writeHead(PROBLEM.status, {
    'Content-Type': 'application/problem+json',
    'Retry-After': '1',
    Connection: 'close',
  });
  res.end(JSON.stringify(PROBLEM));
};

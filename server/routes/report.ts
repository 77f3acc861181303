/** The evidence for a version: as data for the page, and as a PDF. */
import { reportSchema } from '@/shared/contracts/report';
import { safeFileName } from '@/workers';
import { reportPdf } from '../report/pdf';
import { makeReport } from '../services/report';
import { versionParams } from './parts';
import { type Route, SENT, workspaceRoute } from './route';

const tag = 'Reports';
const ONE = '/parameter-sets/:id/versions/:n';

export const reportRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: `${ONE}/report`,
    tag,
    summary: 'The evidence for the version',
    permission: 'export:read',
    params: versionParams,
    success: { status: 200, description: 'The report', schema: reportSchema, name: 'Report' },
    handle: ({ ctx, actor, params: { id, n } }) => makeReport(ctx, actor, id, n),
  }),
  workspaceRoute({
    method: 'get',
    path: `${ONE}/report.pdf`,
    tag,
    summary: 'The same as a PDF',
    permission: 'export:read',
    params: versionParams,
    success: { status: 200, description: 'The file', binary: ['application/pdf'] },
    handle: async ({ ctx, actor, params: { id, n }, res }) => {
      const report = await makeReport(ctx, actor, id, n);
      const body = await reportPdf(report);
      res.attachment(`${safeFileName(`${report.set.name}-v${n}-report`)}.pdf`);
      res.setHeader('Content-Type', 'application/pdf');
      res.send(body);
      return SENT;
    },
  }),
];

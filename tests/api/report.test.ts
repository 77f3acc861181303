/** The report of a version: as data and as a PDF. Every figure in it is the API's. */
import type { ParameterSetDetail } from '@/shared/contracts/parameter-sets';
import { reportSchema, type Report } from '@/shared/contracts/report';
import type { Recording } from '@/shared/contracts/recordings';
import type { Run } from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import { percentile } from '@/shared/math/percentile';
import { metricValue } from '@/shared/requirements/metric-words';
import { type Api, startApi } from '../support/api';
import { buildMember, buildRecording, buildVehicle } from '../support/api-factories';
import { buildDraft, buildRequirement, every, verified } from '../support/api-verification';
import { needPoppler, pdfText, type PdfText } from '../support/pdf-text';

jest.setTimeout(180_000);

describe('the report', () => {
  let api: Api;
  let engineer: Awaited<ReturnType<typeof buildMember>>;
  let approver: typeof engineer;
  let recordings: Recording[];
  let path: string;
  let report: Report;
  let pdf: PdfText;

  const reportOf = async () => reportSchema.parse((await engineer.get(`${path}/report`)).body);

  beforeAll(async () => {
    needPoppler();
    api = await startApi({ WORKERS: '2' });
    engineer = await buildMember(api, 'engineer');
    approver = await buildMember(api, 'approver', engineer.workspaceId);
    recordings = [
      await buildRecording(engineer, { name: 'A breakwater' }),
      await buildRecording(engineer, { name: 'B harbour' }),
    ];
    const ids = recordings.map(({ id }) => id);
    const { id: vehicleId } = await buildVehicle(engineer, { name: 'Crawler 7', leverArmM: [0.4, 0, -1.2] });
    await buildRequirement(engineer, ids, { name: 'Drift kept' });
    await buildRequirement(engineer, [ids[0]!], { name: 'Yaw kept', metric: { kind: 'attitude-sigma', axis: 'yaw', when: 'end' }, limit: 1e-9, schedule: every(15, 10) }); // prettier-ignore
    ({ path } = await buildDraft(engineer, vehicleId, { gnss: { positionScale: 1.25 } }));
    await verified(engineer, path);
    await engineer.post(`${path}/submit`);
    const { requirements } = (await engineer.get(`${path}/verification`)).body as Report['matrix'];
    const yaw = requirements.find(({ name }) => name === 'Yaw kept')!;
    await approver.post(`${path}/waivers`, {
      requirementId: yaw.id,
      recordingId: ids[0],
      text: 'The limit is far beyond what the sensor can give.',
    });
    const released = await approver.post(`${path}/release`, { comment: 'Seen on the bench.' });
    expect(released.status).toBe(200);
    report = await reportOf();
    const answer = await engineer.get(`${path}/report.pdf`);
    expect(answer.headers.get('content-type')).toBe('application/pdf');
    expect(answer.headers.get('content-disposition')).toMatch(/^attachment; filename="?\S*report\.pdf"?$/);
    pdf = pdfText(answer.bytes);
  });
  afterAll(() => api.stop());

  it('says first what it is, what was proven and what to beware of', () => {
    expect(report.summary[0]).toMatch(/^RELEASED for Crawler 7/);
    expect(report.summary.join(' ')).toContain('2 of 3 cells pass, 1 waived in writing');
    expect(report.people.map(({ did }) => did)).toEqual(['Drafted', 'Submitted', 'Released']);
    for (const caution of report.cautions) expect(pdf.pages[0]!.replace(/\s+/g, ' ')).toContain(caution);
    expect(pdf.text).toContain('The limit is far beyond what the sensor can give.');
    expect(pdf.text).toContain('The reviewer says: Seen on the bench.');
  });

  it('gives each verdict with its value, its recording and the hashes of the data', () => {
    expect(report.matrix.asReleased).toBe(true);
    for (const cell of report.matrix.cells) {
      const requirement = report.matrix.requirements.find(({ id }) => id === cell.requirementId)!;
      expect(pdf.text).toContain(requirement.name);
      expect(pdf.text).toContain(metricValue(requirement.metric, cell.value!).replace(/\s/g, ' '));
    }
    for (const { sha256, files } of report.recordings) {
      expect(pdf.text).toContain(sha256!);
      for (const file of files) expect(pdf.text).toContain(file.sha256);
    }
    expect(report.recordings.map(({ sha256 }) => sha256)).toEqual(
      report.matrix.recordings.map(({ sha256 }) => sha256),
    );
  });

  it('takes its figures from the runs themselves', async () => {
    expect(report.runs).toHaveLength(2);
    for (const shown of report.runs) {
      const run = (await engineer.get(`/runs/${shown.runId}`)).body as Run;
      expect(shown.groups).toEqual(run.summary!.groups);
      expect(shown.resultSha256).toBe(run.provenance!.resultSha256);
      const after10 = run.summary!.outages.flatMap(({ points }) =>
        points.filter(({ afterS }) => afterS === 10),
      );
      const [drift] = shown.drift;
      expect(drift).toMatchObject({ afterS: 10, windows: after10.length });
      const horizontal = after10.map(({ horizontalM }) => horizontalM);
      expect(drift!.p95M).toBeCloseTo(percentile(horizontal, 0.95), 12);
      expect(drift!.maximumM).toBe(Math.max(...horizontal));
      expect(pdf.text).toContain(`${formatNumber(drift!.p95M)} m`);
    }
  });

  it('lists every parameter with its unit, and draws the drift', () => {
    const scale = report.parameters.find(({ path: at }) => at === 'gnss.positionScale')!;
    expect(scale).toMatchObject({ value: 1.25, before: null, changed: false });
    expect(pdf.text).toContain(`${scale.group}: ${scale.label}`);
    expect(
      report.parameters.every(({ value, unit }) => typeof value !== 'number' || unit !== undefined),
    ).toBe(true);
    expect(pdf.text).toContain('s without GNSS');
    expect(pdf.text).toContain('95 % predicted');
    expect(pdf.pages.length).toBeGreaterThan(2);
    expect(pdf.pages[0]).toContain(`page 1 of ${pdf.pages.length}`);
  });

  it('of a draft says on every page that it is not released', async () => {
    const revised = await engineer.post(`${path}/revise`, {});
    expect(revised.status).toBe(201);
    const setPath = path.replace(/\/versions\/1$/, '');
    const set = (await engineer.get(setPath)).body as ParameterSetDetail;
    const draft = `${setPath}/versions/${set.latest.number}`;
    const said = reportSchema.parse((await engineer.get(`${draft}/report`)).body);
    expect(said.notice).toMatch(/^NOT RELEASED/);
    expect(said.against).toBe(1);
    const pages = pdfText((await engineer.get(`${draft}/report.pdf`)).bytes).pages;
    for (const page of pages) expect(page).toContain('NOT RELEASED');
  });

  it('of another workspace is not there', async () => {
    const outsider = await buildMember(api, 'admin');
    expect((await outsider.get(`${path}/report`)).status).toBe(404);
    expect((await outsider.get(`${path}/report.pdf`)).status).toBe(404);
  });
});

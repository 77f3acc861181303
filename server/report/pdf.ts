/** The report as a PDF: summary first, then what it rests on. */
import type { Report, ReportParameter, ReportRun } from '@/shared/contracts/report';
import type { VerificationCell } from '@/shared/contracts/verification';
import { formatDuration, formatNumber } from '@/shared/format';
import { metricValue, scheduleWords } from '@/shared/requirements/metric-words';
import { drawDrift } from './plots';
import { type Cell, type InkName, Sheet } from './sheet';

/** A4 pages with numbered feet. */
export async function reportPdf(report: Report): Promise<Buffer> {
  const { set, version, notice } = report;
  const name = `${set.name}, version ${version.number}`;
  const sheet = new Sheet(`${name}: report`, `${name} · ${notice} · made ${day(report.madeAt)}`);
  head(sheet, report);
  matrix(sheet, report);
  runs(sheet, report.runs);
  recordings(sheet, report);
  parameters(sheet, report);
  method(sheet, report);
  return sheet.finish();
}

function head(
  sheet: Sheet,
  { set, version, vehicle, notice, summary, people, reviewComment, cautions }: Report,
): void {
  sheet.title(`${set.name}, version ${version.number}`);
  sheet.paragraph(notice, version.state === 'released' ? 'pine' : 'vermilion');
  sheet.heading('Summary');
  for (const sentence of summary.slice(1)) sheet.paragraph(sentence);
  sheet.subheading('Cautions');
  for (const line of cautions) sheet.paragraph(`·  ${line}`, 'ochre');
  sheet.heading('Vehicle, people and dates');
  if (vehicle) {
    const arm = vehicle.leverArmM.map((metres) => formatNumber(metres)).join(', ');
    sheet.paragraph(`${vehicle.name}. GNSS antenna seen from the IMU, forward, right, down: ${arm} m.`);
    if (vehicle.sensor) sheet.paragraph(`IMU: ${vehicle.sensor}.`);
  } else sheet.paragraph('The set has no vehicle.');
  sheet.table(
    [
      { title: 'Step', share: 0.3 },
      { title: 'Who', share: 0.4 },
      { title: 'When (UTC)', share: 0.3 },
    ],
    people.map(({ did, name, at }) => [text(did), text(name), text(moment(at))]),
  );
  if (reviewComment) sheet.paragraph(`The reviewer says: ${reviewComment}`);
}

function matrix(
  sheet: Sheet,
  { matrix: { requirements, recordings: columns, cells, withoutRequirements } }: Report,
): void {
  sheet.heading('Verification');
  if (withoutRequirements) sheet.paragraph(`Released without requirements: ${withoutRequirements}`, 'ochre');
  if (cells.length === 0) return sheet.paragraph('Nothing was verified.', 'ochre');
  for (const requirement of requirements) {
    const own = cells.filter(({ requirementId }) => requirementId === requirement.id);
    if (own.length === 0) continue;
    sheet.subheading(requirement.name);
    sheet.small(`${requirement.sentence}. Outages: ${scheduleWords(requirement.schedule)}.`);
    sheet.table(
      [
        { title: 'Recording', share: 0.36 },
        { title: 'Value', share: 0.2, align: 'right', face: 'number' },
        { title: 'Verdict', share: 0.18 },
        { title: 'Remark', share: 0.26 },
      ],
      own.map((cell) => {
        const verdict = verdictOf(cell);
        return [
          text(columns.find(({ id }) => id === cell.recordingId)?.name ?? ''),
          text(cell.value === null ? '–' : metricValue(requirement.metric, cell.value)),
          verdict,
          text(remarkOf(cell)),
        ];
      }),
    );
  }
  const waived = cells.filter(({ waiver }) => waiver !== null);
  if (waived.length === 0) return;
  sheet.subheading('Waivers');
  for (const { waiver, requirementId, recordingId } of waived) {
    const requirement = requirements.find(({ id }) => id === requirementId)?.name ?? '';
    const recording = columns.find(({ id }) => id === recordingId)?.name ?? '';
    sheet.paragraph(
      `${requirement} on ${recording}: ${waiver!.text} (${waiver!.createdBy}, ${moment(waiver!.createdAt)})`,
    );
  }
}

function verdictOf({ verdict, outOfDate, waiver }: VerificationCell): Cell {
  const [words, ink] = verdict ? VERDICTS[verdict] : (['not verified', 'inkSoft'] as const);
  if (waiver) return { text: `${words}, waived`, ink: 'ochre' };
  return outOfDate.length > 0 ? { text: `${words}, out of date`, ink: 'ochre' } : { text: words, ink };
}
const VERDICTS: Record<NonNullable<VerificationCell['verdict']>, readonly [string, InkName]> = {
  pass: ['passes', 'pine'],
  fail: ['fails', 'vermilion'],
  'not-applicable': ['not applicable', 'ochre'],
  failed: ['run failed', 'vermilion'],
};

const remarkOf = ({ bounds, reason, outOfDate }: VerificationCell) =>
  [
    bounds ? `bounds ${formatNumber(bounds[0])} to ${formatNumber(bounds[1])}` : '',
    reason ?? '',
    outOfDate.length > 0 ? `because ${outOfDate.join(' and ')}` : '',
  ]
    .filter(Boolean)
    .join('; ');

function runs(sheet: Sheet, all: readonly ReportRun[]): void {
  sheet.heading('Consistency and drift');
  if (all.length === 0) sheet.paragraph('No run stands behind this version.', 'ochre');
  for (const run of all) {
    sheet.subheading(run.recordingName);
    sheet.small(
      `Outages: ${run.schedule}. Engine ${run.engineVersion}. Result ${run.resultSha256 ?? 'not kept'}.`,
    );
    sheet.table(
      [
        { title: 'Measurement', share: 0.2 },
        { title: 'Mean NIS', share: 0.16, align: 'right', face: 'number' },
        { title: '95 % bounds', share: 0.26, align: 'right', face: 'number' },
        { title: 'Used', share: 0.16, align: 'right', face: 'number' },
        { title: 'Rejected', share: 0.22, align: 'right', face: 'number' },
      ],
      run.groups.map(({ group, nisMean, nisBounds, used, rejected }) => [
        text(group),
        text(nisMean === null ? '–' : formatNumber(nisMean)),
        text(nisBounds ? `${formatNumber(nisBounds[0])} to ${formatNumber(nisBounds[1])}` : '–'),
        text(String(used)),
        text(
          used + rejected > 0
            ? `${rejected} (${formatNumber((100 * rejected) / (used + rejected), 2)} %)`
            : '–',
        ),
      ]),
    );
    if (run.drift.length > 0) drift(sheet, run);
  }
}

function drift(sheet: Sheet, run: ReportRun): void {
  sheet.table(
    [
      { title: 'Horizontal drift after', share: 0.22 },
      { title: 'Windows', share: 0.12, align: 'right', face: 'number' },
      { title: 'Median', share: 0.13, align: 'right', face: 'number' },
      { title: '95th percentile', share: 0.17, align: 'right', face: 'number' },
      { title: 'Maximum', share: 0.13, align: 'right', face: 'number' },
      { title: 'Predicted', share: 0.13, align: 'right', face: 'number' },
      { title: 'Actual ÷ pred.', share: 0.1, align: 'right', face: 'number' },
    ],
    run.drift.map(({ afterS, windows, medianM, p95M, maximumM, predictedM, ratio }) => [
      text(`${afterS} s`),
      text(String(windows)),
      text(`${formatNumber(medianM)} m`),
      text(`${formatNumber(p95M)} m`),
      text(`${formatNumber(maximumM)} m`),
      text(`${formatNumber(predictedM)} m`),
      text(formatNumber(ratio)),
    ]),
  );
  drawDrift(sheet, run);
}

function recordings(sheet: Sheet, { recordings: all }: Report): void {
  sheet.heading('Data');
  if (all.length === 0) return sheet.paragraph('No recording stands behind this version.', 'ochre');
  for (const { name, durationS, verdict, sha256, files } of all) {
    sheet.subheading(name);
    sheet.paragraph(`${durationS === null ? '' : `${formatDuration(durationS)}. `}${verdict}`);
    for (const file of files) sheet.small(`${file.role}: ${file.name}, SHA-256 ${file.sha256}`);
    if (sha256) sheet.small(`decoded channels: SHA-256 ${sha256}`);
  }
}

function parameters(sheet: Sheet, { parameters: all, against, version }: Report): void {
  sheet.heading('Parameters');
  sheet.small(`SHA-256 over the parameters as canonical JSON (RFC 8785): ${version.checksum}`);
  if (against !== null) sheet.small(`Compared with version ${against}; what changed is marked.`);
  sheet.gap(4);
  sheet.table(
    [
      { title: 'Parameter', share: 0.46 },
      { title: 'Value', share: 0.16, align: 'right', face: 'number' },
      { title: 'Unit', share: 0.12 },
      { title: against === null ? '' : `Version ${against}`, share: 0.16, align: 'right', face: 'number' },
      { title: against === null ? '' : 'Change', share: 0.1, align: 'right', face: 'number' },
    ],
    all.map((one) => [
      { text: `${one.group}: ${one.label}`, ink: one.changed ? 'petrol' : 'ink' },
      written(one.value, one.changed),
      text(one.unit),
      text(against === null ? '' : plain(one.before)),
      text(changeOf(one)),
    ]),
  );
}

const plain = (value: ReportParameter['value']) =>
  value === null ? '–' : typeof value === 'number' ? formatNumber(value) : value;

/** Words are in the label's face, numbers in the mono one. */
const written = (value: ReportParameter['value'], changed: boolean): Cell => ({
  text: plain(value),
  ink: changed ? 'petrol' : 'ink',
  ...(typeof value === 'string' ? { face: 'label' } : {}),
});

const changeOf = ({ changed, percent }: ReportParameter) =>
  !changed ? '' : percent === null ? 'changed' : `${percent > 0 ? '+' : ''}${formatNumber(percent, 2)} %`;

function method(sheet: Sheet, { method: lines, references, engineVersion }: Report): void {
  sheet.heading('Method');
  sheet.paragraph(`Engine ${engineVersion}.`);
  for (const line of lines) sheet.paragraph(line);
  sheet.subheading('References');
  for (const line of references) sheet.paragraph(line, 'inkSoft');
}

const text = (words: string): Cell => ({ text: words });
const day = (iso: string) => iso.slice(0, 10);
const moment = (iso: string) => `${iso.slice(0, 10)} ${iso.slice(11, 16)}`;

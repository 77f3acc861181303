/** The health report: what was found, how serious it is, and the verdict in one line. */
import type { HealthFinding, HealthReport } from '@/shared/contracts/recordings';
import { formatDuration, formatNumber } from '@/shared/format';
import { finding } from './finding';
import type { GnssReport } from './gnss-health';
import type { ImuFacts } from './imu-health';

type Interval = [number, number];

/**
 * `assumed`: what was taken for granted of the columns, in whole sentences; `noted`: what was passed over in the files;
 * `matched`: what units, axes and clocks look like.
 */
export function healthReport(
  imu: ImuFacts,
  gnss: GnssReport,
  assumed: readonly string[],
  noted: readonly HealthFinding[],
  matched: readonly HealthFinding[],
): HealthReport {
  const overlapS: Interval =
    gnss.epochs === 0
      ? [imu.startS, imu.startS]
      : [Math.max(imu.startS, gnss.startS), Math.min(imu.endS, gnss.endS)];
  const findings = [
    ...assumed.map((sentence) => finding('assumed', 'info', sentence, { remedy: 'Say it on the mapping screen if that is wrong.' })),
    ...noted,
    ...rateFindings(imu),
    ...rowFindings(imu),
    ...matched,
    ...gnssFindings(imu, gnss, overlapS),
  ]; // prettier-ignore
  return {
    ...verdictOf(findings),
    imu: { samples: imu.samples, rateHz: imu.rateHz, gaps: imu.gapCount },
    gnss: {
      epochs: gnss.epochs,
      rateHz: gnss.rateHz,
      hasVelocity: gnss.hasVelocity,
      hasPositionSigma: gnss.hasPositionSigma,
      hasVelocitySigma: gnss.hasVelocitySigma,
    },
    overlapS,
    findings,
  };
}

function rateFindings(imu: ImuFacts): HealthFinding[] {
  const found: HealthFinding[] = [];
  if (imu.gapCount > 0) {
    const longest = Math.max(...imu.gapsS.map(([from, to]) => to - from));
    const many = imu.gapCount === 1 ? 'one gap' : `${imu.gapCount} gaps`;
    found.push(
      finding('imu-gaps', 'warn', `The IMU has ${many}, the longest ${formatDuration(longest)}.`, {
        figure: { value: longest, unit: 's' },
        intervals: imu.gapsS,
        remedy: 'The filter bridges gaps with growing uncertainty; judge no drift across them.',
      }),
    );
  }
  if (imu.jitterS > 0.2 * imu.nominalS)
    found.push(
      finding('imu-jitter', 'info', `The IMU’s intervals scatter by ${formatNumber(imu.jitterS * 1000)} ms (RMS) about ${formatNumber(imu.nominalS * 1000)} ms.`, {
        figure: { value: imu.jitterS * 1000, unit: 'ms' },
        remedy: 'Stamp samples with the sensor’s own clock where it has one.',
      }),
    ); // prettier-ignore
  if (imu.clippedS.length > 0) {
    const total = imu.clippedS.reduce((sum, [from, to]) => sum + (to - from), 0);
    found.push(
      finding('clipped', 'warn', `A sensor axis stays at its largest value in ${imu.clippedS.length} stretches, ${formatDuration(total)} in all: it probably reached the end of its range.`, {
        figure: { value: total, unit: 's' },
        intervals: imu.clippedS,
        remedy: 'Use a sensor with a larger range or damp its mounting.',
      }),
    ); // prettier-ignore
  }
  return found;
}

function rowFindings(imu: ImuFacts): HealthFinding[] {
  const found: HealthFinding[] = [];
  if (imu.duplicates > 0)
    found.push(
      finding('duplicates', 'info', `${rows(imu.duplicates)} of the IMU file repeated the row before and dropped out.`, {
        figure: { value: imu.duplicates, unit: 'rows' },
      }),
    ); // prettier-ignore
  if (imu.late > 0)
    found.push(
      finding('imu-order', 'warn', `${rows(imu.late)} of the IMU file came late and ${imu.late === 1 ? 'was' : 'were'} put where the stamps say.`, {
        figure: { value: imu.late, unit: 'rows' },
        intervals: imu.lateS,
        remedy: 'Look at the logger’s queue: samples overtake each other.',
      }),
    ); // prettier-ignore
  if (imu.repeatedStamps > 0)
    found.push(
      finding('repeated-stamps', 'warn', `${rows(imu.repeatedStamps)} of the IMU file had the stamp of the row before but other values and dropped out (first in line ${imu.firstRepeatedLine}).`, {
        figure: { value: imu.repeatedStamps, unit: 'rows' },
        remedy: 'Log time with more digits.',
      }),
    ); // prettier-ignore
  if (imu.incompleteRows > 0)
    found.push(
      finding('incomplete-rows', 'warn', `${rows(imu.incompleteRows)} of the IMU file lacked a value and dropped out (first in line ${imu.firstIncompleteLine}).`, {
        figure: { value: imu.incompleteRows, unit: 'rows' },
      }),
    ); // prettier-ignore
  return found;
}

const rows = (count: number) => (count === 1 ? 'One row' : `${count} rows`);

function gnssFindings(imu: ImuFacts, gnss: GnssReport, overlapS: Interval): HealthFinding[] {
  if (gnss.epochs === 0)
    return [
      finding('no-gnss', 'warn', 'There is no GNSS in it: it serves to find the sensor’s noise, not for runs.', {
        remedy: 'To tune on it, upload it again with the GNSS log of the same drive.',
      }),
    ]; // prettier-ignore
  const found: HealthFinding[] = [];
  const share = (overlapS[1] - overlapS[0]) / (imu.endS - imu.startS);
  if (share < 0.9)
    found.push(
      finding('overlap', 'warn', `GNSS covers only ${Math.round(share * 100)} % of the IMU’s time.`, {
        figure: { value: share * 100, unit: '%' },
        intervals: [overlapS],
        remedy: 'Check that both files belong to the same drive and tell the same time.',
      }),
    );
  if (gnss.gapsS.length > 0) {
    const longest = Math.max(...gnss.gapsS.map(([from, to]) => to - from));
    found.push(
      finding('gnss-gaps', 'info', `GNSS has ${gnss.gapsS.length === 1 ? 'one gap' : `${gnss.gapsS.length} gaps`}, the longest ${formatDuration(longest)}.`, {
        figure: { value: longest, unit: 's' }, intervals: gnss.gapsS,
      }),
    ); // prettier-ignore
  }
  if (gnss.outOfOrder > 0)
    found.push(
      finding('gnss-order', 'warn', `${rows(gnss.outOfOrder)} of the GNSS file came out of order and were sorted.`, {
        figure: { value: gnss.outOfOrder, unit: 'rows' },
      }),
    ); // prettier-ignore
  if (gnss.duplicates > 0)
    found.push(
      finding('gnss-duplicates', gnss.duplicates > gnss.epochs / 10 ? 'warn' : 'info', `${rows(gnss.duplicates)} of the GNSS file had the stamp of the row before and dropped out.`, {
        figure: { value: gnss.duplicates, unit: 'rows' },
        remedy: 'Log the receiver’s time with its fraction of a second.',
      }),
    ); // prettier-ignore
  if (gnss.noFixRows > 0)
    found.push(
      finding('gnss-no-fix', 'info', `${rows(gnss.noFixRows)} of the GNSS file held no fix.`, {
        figure: { value: gnss.noFixRows, unit: 'rows' },
      }),
    ); // prettier-ignore
  if (!gnss.hasHeight)
    found.push(
      finding('no-height', 'warn', 'The GNSS file gives no height.', {
        remedy: 'Name the height column on the mapping screen, where there is one.',
      }),
    ); // prettier-ignore
  if (!gnss.hasVelocity)
    found.push(
      finding('no-velocity', 'info', 'The GNSS file gives no velocity: only positions aid the filter.'),
    );
  if (!gnss.hasPositionSigma)
    found.push(
      finding('no-sigma', 'info', 'The GNSS file gives no accuracies: the parameters’ fixed σ are used.'),
    );
  return found;
}

function verdictOf(findings: readonly HealthFinding[]): Pick<HealthReport, 'verdict' | 'sentence'> {
  const stop = findings.find((one) => one.severity === 'stop');
  if (stop) return { verdict: 'not-usable', sentence: `Not usable as it is. ${stop.sentence}` };
  const warnings = findings.filter((one) => one.severity === 'warn');
  if (warnings.length === 0) return { verdict: 'usable', sentence: 'Usable.' };
  const more = warnings.length > 1 ? ` (and ${warnings.length - 1} more)` : '';
  return { verdict: 'with-care', sentence: `Usable with care. ${warnings[0]!.sentence}${more}` };
}

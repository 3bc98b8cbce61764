import { numberText } from '#lib/format/numberText.ts';
import type { TrialReport } from './trialReport.ts';
import type { MotorlessSummary, MotorSummary } from './trialSummary.ts';

const PERCENT = 100;
const GAP = '  ';

/** The tables for people. */
export function trialTables(report: TrialReport): string {
  const { firstSeed, seedCount } = report;
  return [
    `engine ${report.engineVersion}, ${report.results.length} recordings, seeds ${firstSeed} to ${firstSeed + seedCount - 1} of each class`,
    table(MOTOR_HEADINGS, [...report.motors, report.steadyMotors, report.allMotors].map(motorCells)),
    `wrong ratios: ${ratioText(report.allMotors)}`,
    table(MOTORLESS_HEADINGS, [...report.motorless, report.allMotorless].map(motorlessCells)),
    table(
      ['confidence', 'answers', 'mean', 'right'],
      report.reliability.map(({ fromConfidence, count, meanConfidence, rightShare }) => [
        `from ${numberText(fromConfidence, 1)}`,
        String(count),
        shareText(meanConfidence),
        shareText(rightShare),
      ]),
    ),
  ].join('\n\n');
}

const MOTOR_HEADINGS = [
  'class',
  'n',
  '≤0.2 %',
  '≤0.5 %',
  '≤1 %',
  'ratio',
  'other',
  'refused',
  'bold wrong',
  'covered',
  'trend',
  'trend 95 %',
  'stops',
  'FFT peak ≤1 %',
  '× real time',
] as const;

function motorCells(summary: MotorSummary): string[] {
  const { count } = summary;
  return [
    summary.className,
    String(count),
    shareText(summary.withinFifthPercentCount / count),
    shareText(summary.withinHalfPercentCount / count),
    shareText(summary.withinOnePercentCount / count),
    String(summary.ratioErrorCount),
    String(summary.otherErrorCount),
    String(summary.refusedCount),
    `${summary.boldErrorCount}/${summary.boldCount}`,
    `${summary.coveredCount}/${summary.rightRatioCount}`,
    errorText(summary.medianTrendError),
    errorText(summary.medianHighTrendError),
    summary.stoppedCount > 0 ? shareText(summary.stoppedSeenCount / summary.stoppedCount) : '',
    shareText(summary.strongestPeakWithinOnePercentCount / count),
    numberText(summary.medianTimesRealTime, 0),
  ];
}

const MOTORLESS_HEADINGS = ['class', 'n', 'no rotation', 'unsure', 'wrong', 'bold wrong', '× real time'] as const;

function motorlessCells(summary: MotorlessSummary): string[] {
  return [
    summary.className,
    String(summary.count),
    shareText(summary.noRotationCount / summary.count),
    String(summary.unsureCount),
    String(summary.wrongCount),
    String(summary.boldErrorCount),
    numberText(summary.medianTimesRealTime, 0),
  ];
}

function ratioText({ ratioErrors }: MotorSummary): string {
  const parts = Object.entries(ratioErrors).map(([name, count]) => `${name} ${count}`);
  return parts.length > 0 ? parts.join(', ') : 'none';
}

function shareText(share: number): string {
  return Number.isFinite(share) ? `${numberText(PERCENT * share, 1)} %` : '';
}

function errorText(error: number): string {
  return Number.isFinite(error) ? `${numberText(PERCENT * error, 3)} %` : '';
}

/** First column left, numbers right. */
function table(headings: readonly string[], rows: readonly (readonly string[])[]): string {
  const lines = [headings, ...rows];
  const widths = headings.map((_, column) => Math.max(...lines.map((line) => (line[column] ?? '').length)));
  const padded = (cell: string, column: number) =>
    column === 0 ? cell.padEnd(widths[column] ?? 0) : cell.padStart(widths[column] ?? 0);
  return lines.map((line) => line.map(padded).join(GAP).trimEnd()).join('\n');
}

import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { numberText } from '#lib/format/numberText.ts';
import { uncertainText } from '#lib/format/uncertainText.ts';
import type { AnalysisLine } from './analysisLine.ts';

const HEADINGS = ['file', 'rpm', '95 % interval', 'sure', 'motion', 'note'] as const;
const GAP = '  ';
const PERCENT = 100;

/** The lines of `analyse` as a table for people, headings first; columns are as wide as their longest text. */
export function analysisTable(lines: readonly AnalysisLine[]): string {
  const rows = [HEADINGS, ...lines.map(cells)];
  const widths = HEADINGS.map((_, column) => Math.max(...rows.map((row) => (row[column] ?? '').length)));
  return rows
    .map((row) =>
      row
        .map((cell, column) => cell.padEnd(widths[column] ?? 0))
        .join(GAP)
        .trimEnd(),
    )
    .join('\n');
}

function cells(line: AnalysisLine): readonly string[] {
  const { file, rpm, rpmLow, rpmHigh, confidence, motion } = line;
  if (rpm === null || rpmLow === null || rpmHigh === null || confidence === null) {
    return [file, '–', '', '', motion ?? '', noteOf(line)];
  }
  const { value, low, high } = uncertainText({ value: rpm, low: rpmLow, high: rpmHigh });
  const sure = `${numberText(confidence * PERCENT, 0)} %`;
  return [file, value, `${low} … ${high}`, sure, motion ?? '', noteOf(line)];
}

function noteOf({ status, reason, confidence, error, warnings }: AnalysisLine): string {
  const notes: string[] = [...warnings];
  if (status === 'no-rotation') notes.unshift(`no rotation: ${reason ?? 'unknown'}`);
  if (confidence !== null && confidence < UNSURE_BELOW_CONFIDENCE) notes.unshift('unsure');
  if (error) notes.unshift(`failed: ${error.message}`);
  return notes.join(', ');
}

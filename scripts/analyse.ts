/** `npm run analyse`: files on this machine to readings, without server, database or settings. */
import { analyseFiles } from './analyse/analyseFiles.ts';
import { parseAnalyseArguments, USAGE, UsageError } from './analyse/analyseArguments.ts';
import type { AnalysisLine } from './analyse/analysisLine.ts';
import { analysisTable } from './analyse/analysisTable.ts';

/** Where the build puts the thread, seen from the bundle of this file. */
const THREAD_ENTRY = new URL('../worker/threads/analyse.mjs', import.meta.url);

const EVERY_FILE_READ = 0;
const A_FILE_FAILED = 1;
const BAD_USAGE = 2;

/** @returns the exit status: 0 when every file was read, whatever was found; 1 when one failed; 2 for bad usage */
export async function main(programArguments: readonly string[]): Promise<number> {
  try {
    return await analyse(programArguments);
  } catch (error) {
    if (!(error instanceof UsageError)) throw error;
    process.stderr.write(`${error.message}\n\n${USAGE}\n`);
    return BAD_USAGE;
  }
}

async function analyse(programArguments: readonly string[]): Promise<number> {
  const { files, jobCount, isJson, isHelp } = parseAnalyseArguments(programArguments);
  if (isHelp) {
    process.stdout.write(`${USAGE}\n`);
    return EVERY_FILE_READ;
  }
  const lines: AnalysisLine[] = [];
  for await (const line of analyseFiles({ files, jobCount, threadEntry: THREAD_ENTRY })) {
    lines.push(line);
    if (isJson) process.stdout.write(`${JSON.stringify(line)}\n`);
  }
  if (!isJson) process.stdout.write(`${analysisTable(lines)}\n`);
  return lines.some(({ status }) => status === 'failed') ? A_FILE_FAILED : EVERY_FILE_READ;
}

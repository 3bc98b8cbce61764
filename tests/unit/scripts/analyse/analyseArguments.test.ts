import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { parseAnalyseArguments, UsageError } from '#scripts/analyse/analyseArguments.ts';

let folder = '';
const listFile = (...lines: string[]): string => {
  const file = join(folder, `${String(lines.join('').length)}.jsonl`);
  writeFileSync(file, lines.join('\n'));
  return file;
};

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'ripplebench-list-'));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

describe('parseAnalyseArguments', () => {
  it('takes one event per turn and 60 to 60,000 rpm when nothing is said', () => {
    const [file] = parseAnalyseArguments(['a.wav']).files;
    expect(file).toMatchObject({
      file: 'a.wav',
      settings: { eventsPerTurn: 1, orders: [], minimumRpm: 60, maximumRpm: 60_000 },
    });
  });

  it('takes a fraction of an event per turn', () => {
    const [file] = parseAnalyseArguments(['--events-per-turn', '0.5', 'a.wav']).files;
    expect(file?.settings.eventsPerTurn).toBe(0.5);
  });

  it('takes the first of the orders as the events per turn', () => {
    const [file] = parseAnalyseArguments(['--orders', '6,1,12', 'a.wav']).files;
    expect(file?.settings).toMatchObject({ eventsPerTurn: 6, orders: [6, 1, 12] });
  });

  it('keeps the order of the files', () => {
    const { files } = parseAnalyseArguments(['b.wav', '--json', 'a.wav', 'c.wav']);
    expect(files.map(({ file }) => file)).toEqual(['b.wav', 'a.wav', 'c.wav']);
  });

  it('reads a list with paths relative to the list, its fields before the options', () => {
    const list = listFile('{"file":"x/a.wav","orders":[10,2],"rpmTrue":300}', '', '{"file":"/b.wav","rpmMax":900}');
    const { files } = parseAnalyseArguments(['--list', list, '--events-per-turn', '3', '--rpm-min', '100']);
    expect(files).toHaveLength(2);
    expect(files[0]).toMatchObject({
      file: 'x/a.wav',
      path: join(folder, 'x/a.wav'),
      settings: { eventsPerTurn: 10, orders: [10, 2], minimumRpm: 100, maximumRpm: 60_000 },
    });
    expect(files[1]).toMatchObject({
      path: '/b.wav',
      settings: { eventsPerTurn: 3, minimumRpm: 100, maximumRpm: 900 },
    });
  });

  it.each([
    ['no file', []],
    ['an unknown option', ['--fast', 'a.wav']],
    ['an option without its value', ['a.wav', '--jobs']],
    ['0 events per turn', ['--events-per-turn', '0', 'a.wav']],
    ['a number with a unit', ['--rpm-min', '100rpm', 'a.wav']],
    ['a hexadecimal number', ['--rpm-min', '0x64', 'a.wav']],
    ['an empty order', ['--orders', '6,,2', 'a.wav']],
    ['a slowest speed above the fastest', ['--rpm-min', '900', '--rpm-max', '100', 'a.wav']],
    ['half a job', ['--jobs', '1.5', 'a.wav']],
    ['65 jobs', ['--jobs', '65', 'a.wav']],
    ['a list that is not there', ['--list', '/nowhere.jsonl']],
  ])('refuses %s', (_, programArguments) => {
    expect(() => parseAnalyseArguments(programArguments)).toThrow(UsageError);
  });

  it('names the line of a list that is not JSON', () => {
    const list = listFile('{"file":"a.wav"}', 'file: b.wav');
    expect(() => parseAnalyseArguments(['--list', list])).toThrow(/line 2 of .*not JSON/);
  });

  it('names the field of a list that is out of range', () => {
    const list = listFile('{"file":"a.wav","eventsPerTurn":-1}');
    expect(() => parseAnalyseArguments(['--list', list])).toThrow(/line 1 .*eventsPerTurn: Must be a number above 0/);
  });
});

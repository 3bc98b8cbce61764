import { mkdirSync, mkdtempSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sourceHash } from '#scripts/setup/build.mjs';

let project: string;

beforeAll(() => {
  project = mkdtempSync(join(tmpdir(), 'ripplebench-hash-'));
  mkdirSync(join(project, 'src/lib'), { recursive: true });
  writeFileSync(join(project, 'src/lib/a.ts'), 'a');
});
afterAll(() => {
  rmSync(project, { recursive: true });
});

describe('sourceHash', () => {
  it('is the same for the same sources', () => {
    expect(sourceHash(project)).toBe(sourceHash(project));
  });

  it('changes with any byte, any new file and any moved one', () => {
    const hashes = [sourceHash(project)];
    const change = (act: () => void) => {
      act();
      hashes.push(sourceHash(project));
    };
    change(() => {
      writeFileSync(join(project, 'src/lib/a.ts'), 'b');
    });
    change(() => {
      writeFileSync(join(project, 'package.json'), '{}');
    });
    change(() => {
      renameSync(join(project, 'src/lib/a.ts'), join(project, 'src/a.ts'));
    });
    expect(new Set(hashes).size).toBe(hashes.length);
  });

  it('is not changed by what is no source', () => {
    const before = sourceHash(project);
    writeFileSync(join(project, 'README.md'), 'words');
    expect(sourceHash(project)).toBe(before);
  });
});

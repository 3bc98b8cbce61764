import { afterEach, describe, expect, it, vi } from 'vitest';
import { ensurePrograms, findProgram } from '#scripts/setup/programs.mjs';

describe('ensurePrograms', () => {
  afterEach(() => vi.restoreAllMocks());

  it('does nothing when everything is there', async () => {
    await expect(ensurePrograms({ node: 'nodejs' })).resolves.toBeUndefined();
  });

  it('names the missing programs and the packages that bring them when it may not install', async () => {
    // The rights of the process are not ours to change in a test; what it reports about them is.
    vi.spyOn(process, 'getuid').mockReturnValue(1000);
    const programs = {
      node: 'nodejs',
      'no-such-program': 'its-package',
      'nor-this-one': 'other-package',
    };
    await expect(ensurePrograms(programs)).rejects.toThrow(
      /no-such-program {2}\(Debian package its-package\)[\s\S]*nor-this-one[\s\S]*apt-get install its-package other-package/,
    );
  });
});

describe('findProgram', () => {
  it('finds what the path holds and says null otherwise', () => {
    expect(findProgram('sh')).toMatch(/\/sh$/);
    expect(findProgram('no-such-program')).toBeNull();
  });
});

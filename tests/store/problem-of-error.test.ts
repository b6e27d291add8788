import { describe, expect, it } from 'vitest';
import { folderModeOf } from '../../src/store/permissions.js';
import { problemOfError } from '../../src/store/problem-of-error.js';

describe('problemOfError', () => {
  it.each([
    ['read', 'ENOENT', 66],
    ['read', 'ENOTDIR', 66],
    ['read', 'EISDIR', 66],
    ['read', 'EACCES', 74],
    ['read', 'EIO', 74],
    ['create', 'EACCES', 73],
    ['create', 'ENOSPC', 73],
    ['write', 'ENOSPC', 74],
    ['write', 'EIO', 74],
    ['write', 'EUNHEARDOF', 74],
  ] as const)('while trying to %s, %s asks for exit code %i', (doing, code, exitCode) => {
    const problem = problemOfError(Object.assign(new Error('x'), { code }), doing, 'the preset', '/a/b.json');
    expect(problem).toMatchObject({ exitCode, path: '/a/b.json' });
    expect(problem.message).toMatch(new RegExp(`^The preset /a/b\\.json .*\\(${code}\\)\\.$`));
    expect(problem.hint).not.toBe('');
  });

  it('lets no control character of a path or a message through', () => {
    const problem = problemOfError(new Error('\u001b[2J'), 'read', 'the preset', '/a/\u001b]0;x\u0007b');
    expect(JSON.stringify(problem)).not.toMatch(/\\u00|\\b/);
  });

  it('takes what is no error as well', () => {
    expect(problemOfError(null, 'read', 'the preset', '/a').exitCode).toBe(74);
  });
});

describe('folderModeOf', () => {
  it.each([
    [0o600, 0o700],
    [0o640, 0o750],
    [0o660, 0o770],
    [0o664, 0o775],
    [0o620, 0o730],
  ])('lets whoever may use a file of mode %i enter', (file, folder) => expect(folderModeOf(file)).toBe(folder));
});

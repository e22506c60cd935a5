import { describe, expect, it } from 'vitest';
import { withPastedName } from '#client/features/drawings/upload/incoming-files.ts';

const at = new Date('2026-12-01T10:42:07Z');

describe('a pasted file', () => {
  it('keeps a name of its own', () => {
    const file = new File(['x'], 'HF-114.tif');
    expect(withPastedName(file, at)).toBe(file);
  });

  it('from the clipboard gets the time as its name, since the clipboard calls every picture the same', () => {
    const file = new File(['x'], 'image.png', { type: 'image/png' });
    expect(withPastedName(file, at)).toMatchObject({
      name: 'Pasted 2026-12-01 10.42.07.png',
      type: 'image/png',
    });
  });
});

import { describe, expect, it } from 'vitest';
import { ALL_KEYS } from '#client/features/desk/components/desk-keys.ts';
import { isPressed } from '#client/features/desk/components/key-binding.ts';
import { keyWords } from '#client/features/desk/components/key-list.tsx';
import { PART_KEYS } from '#client/features/desk/components/part-keys.ts';
import { type KeyId, keysText } from '#client/text/keys.ts';

const KEYS = [...PART_KEYS, ...ALL_KEYS];
const pressed = (key: string, held: Partial<KeyboardEvent> = {}) => ({ key, ...held }) as KeyboardEvent;

describe('the list of keys', () => {
  it('tells of every key what it does, and of nothing that no key does', () => {
    const told = Object.keys(keysText.does) as KeyId[];
    const done = new Set(KEYS.map(({ id }) => id));
    // A place of a soil is set from the form of the soil alone.
    expect(told.filter((id) => !done.has(id))).toEqual(['soilPlace']);
    for (const { id, group, presses } of KEYS) {
      expect(keysText.does[id]).not.toBe('');
      expect(keysText.groups[group]).not.toBe('');
      expect(presses.length).toBeGreaterThan(0);
    }
  });

  it('gives a letter one meaning', () => {
    const letters = KEYS.flatMap(({ presses }) => presses)
      .filter(({ key }) => /^[a-z]$/.test(key))
      .map(({ key, ctrl, shift, alt }) => [key, ctrl, shift, alt].join());
    expect(letters.filter((letter, i) => letters.indexOf(letter) !== i)).toEqual([]);
  });

  it('writes keys as they stand on the keyboard', () => {
    expect(keyWords([{ key: 'z', ctrl: true, shift: true }])).toEqual([['Ctrl', 'Shift', 'Z']]);
    expect(keyWords([{ key: ' ' }])).toEqual([['Space']]);
    const fine = KEYS.find(({ id }) => id === 'fineCrosshair');
    expect(keyWords(fine?.presses ?? [])).toEqual([
      ['Ctrl', 'Arrow keys'],
      ['Alt', 'Arrow keys'],
    ]);
  });

  it('takes a sign with Shift or without, a letter and a named key only as they are told', () => {
    expect(isPressed({ key: '?' }, pressed('?', { shiftKey: true }))).toBe(true);
    expect(isPressed({ key: '?' }, pressed('?'))).toBe(true);
    expect(isPressed({ key: 'h' }, pressed('H', { shiftKey: true }))).toBe(false);
    expect(isPressed({ key: 'h', shift: true }, pressed('H', { shiftKey: true }))).toBe(true);
    expect(isPressed({ key: ' ' }, pressed(' ', { shiftKey: true }))).toBe(false);
    expect(isPressed({ key: 'z', ctrl: true }, pressed('z', { metaKey: true }))).toBe(true);
  });
});

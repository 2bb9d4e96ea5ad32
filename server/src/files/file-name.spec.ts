import fc from 'fast-check';
import { cleanFileName, extensionOf } from './file-name.ts';

describe('names of files (D-44)', () => {
  it.each([
    ['../../etc/passwd', 'passwd'],
    ['C:\\photos\\wall.jpg', 'wall.jpg'],
    ['a\r\nSet-Cookie:x.jpg', 'aSet-Cookie x.jpg'],
    ['wall\u0000.jpg', 'wall.jpg'],
    ['wall\u202egpj.exe', 'wallgpj.exe'],
    ['CON', 'file CON'],
    ['nul.pdf', 'file nul.pdf'],
    ['   ..  ', 'file'],
    ['', 'file'],
    ['Pläne Ebene 2.pdf', 'Pläne Ebene 2.pdf'],
  ])('%j becomes %j', (raw, clean) => {
    expect(cleanFileName(raw)).toBe(clean);
  });

  it('keeps the extension of a very long name', () => {
    const clean = cleanFileName(`${'a'.repeat(5000)}.jpeg`);
    expect(clean).toHaveLength(200);
    expect(extensionOf(clean)).toBe('jpeg');
  });

  it('never gives a path, a control character, half a character or nothing', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 400 }), (raw) => {
        const clean = cleanFileName(raw);
        expect(clean.length).toBeGreaterThan(0);
        expect(clean.length).toBeLessThanOrEqual(200);
        expect(clean).not.toMatch(/[/\\\u0000-\u001f\u202a-\u202e]/);
        expect(clean).not.toMatch(/[\ud800-\udfff]/u);
      }),
    );
  });
});

import { describe, expect, it } from 'vitest';
import { firstBinaryByte } from './first-binary-byte.js';

const bytes = (text: string) => Uint8Array.from(text, (character) => character.charCodeAt(0));

describe('firstBinaryByte', () => {
  it('takes text of any language, with tabs and all line ends, for text', () => {
    expect(firstBinaryByte(bytes('Zeit\tWant [kN]\r\n1\t2\f\n'))).toBe(-1);
    expect(firstBinaryByte(bytes('tid,last p\u00e5 st\u00e5l\n1,2,3\n'))).toBe(-1);
    expect(firstBinaryByte(new Uint8Array(0))).toBe(-1);
  });

  it('finds a NUL wherever it is', () => {
    expect(firstBinaryByte(bytes(`${'time,load\n'.repeat(500)}\u0000`))).toBe(5000);
  });

  it('lets one stray control character in a hundred pass, and no more', () => {
    const line = (controls: number) => bytes('x'.repeat(200 - controls) + '\u0007'.repeat(controls));
    expect(firstBinaryByte(line(2))).toBe(-1);
    expect(firstBinaryByte(line(3))).toBe(197);
  });
});

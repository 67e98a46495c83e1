import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { COLOURS, cssVariables, type ColourMode } from './tokens';

/** Contrast ratio as defined in WCAG 2.2, "relative luminance" and "contrast ratio". */
function contrast(first: string, second: string): number {
  const luminance = (hex: string) => {
    const [red, green, blue] = [1, 3, 5].map((at) => {
      const share = parseInt(hex.slice(at, at + 2), 16) / 255;
      return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
    });
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
  };
  const [dark, light] = [luminance(first), luminance(second)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

const css = readFileSync(`${import.meta.dirname}/theme.css`, 'utf8');

const printCss = readFileSync(`${import.meta.dirname}/print.css`, 'utf8');

/** Declarations of the block that follows a selector. */
function declared(selector: string, sheet = css): Record<string, string> {
  const from = sheet.indexOf('{', sheet.indexOf(selector));
  const block = sheet.slice(from + 1, sheet.indexOf('}', from));
  return Object.fromEntries(
    [...block.matchAll(/(--[\w-]+):\s*(#[0-9a-f]{6});/g)].map(([, name, value]) => [name, value]),
  );
}

describe('theme.css', () => {
  it.each<[string, ColourMode]>([
    [':root {', 'light'],
    [":root:not([data-theme='light']) {", 'dark'],
    [":root[data-theme='dark'] {", 'dark'],
  ])('declares under %s exactly the tokens of the %s mode', (selector, mode) => {
    const wanted = Object.fromEntries(
      Object.entries(cssVariables(mode)).map(([name, value]) => [name, value.toLowerCase()]),
    );
    expect(declared(selector)).toEqual(wanted);
  });
});

describe('print.css', () => {
  it('prints the light tokens on white, whatever the screen shows', () => {
    const wanted = { ...cssVariables('light'), '--paper': '#ffffff', '--sheet': '#ffffff' };
    expect(declared(":root[data-theme='dark'] {", printCss)).toEqual(
      Object.fromEntries(Object.entries(wanted).map(([name, value]) => [name, value.toLowerCase()])),
    );
  });
});

describe.each<ColourMode>(['light', 'dark'])('colours of the %s mode', (mode) => {
  const colours = COLOURS[mode];

  it('give every text 4.5:1 on both grounds', () => {
    for (const ground of [colours.paper, colours.sheet]) {
      for (const text of [colours.ink, colours.inkSoft, colours.primary, colours.rust, colours.brass]) {
        expect(contrast(text, ground), `${text} on ${ground}`).toBeGreaterThanOrEqual(4.5);
      }
    }
    expect(contrast(colours.onPrimary, colours.primary)).toBeGreaterThanOrEqual(4.5);
    expect(contrast(colours.onRust, colours.rust)).toBeGreaterThanOrEqual(4.5);
  });

  it('give the outline of controls and the ink of the part mark 3:1', () => {
    for (const ground of [colours.paper, colours.sheet]) {
      expect(contrast(colours.ramp[3], ground)).toBeGreaterThanOrEqual(3);
      expect(contrast(colours.ramp[4], ground)).toBeGreaterThanOrEqual(3);
    }
  });
});

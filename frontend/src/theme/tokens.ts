/** The one source of every colour, size and face; antd, nivo and our own style sheets are made from it. */
export type ColourMode = 'light' | 'dark';

export interface ColourTokens {
  paper: string;
  sheet: string;
  rule: string;
  ink: string;
  inkSoft: string;
  /** Ink ramp, faint to full; the first three stand only inside a 3:1 outline. */
  ramp: readonly [string, string, string, string, string, string];
  primary: string;
  onPrimary: string;
  /** Due or overdue, nothing else. */
  rust: string;
  onRust: string;
  /** Needs attention. */
  brass: string;
}

export const COLOURS: Readonly<Record<ColourMode, ColourTokens>> = {
  light: {
    paper: '#F7F4EC',
    sheet: '#FFFDF8',
    rule: '#DDD6C6',
    ink: '#1B2A30',
    inkSoft: '#56666C',
    ramp: ['#E1E8EA', '#B9CAD0', '#8AA6B0', '#567F8E', '#27566A', '#0E3040'],
    primary: '#1F5366',
    onPrimary: '#FFFDF8',
    rust: '#A8431F',
    onRust: '#FFFDF8',
    brass: '#8A6A1F',
  },
  dark: {
    paper: '#10191D',
    sheet: '#172329',
    rule: '#2B3B42',
    ink: '#E4EAE8',
    inkSoft: '#9DB0B4',
    ramp: ['#22343B', '#35505A', '#517783', '#79A3AE', '#A9CBD2', '#DCEEF0'],
    primary: '#7FB8C6',
    onPrimary: '#10191D',
    rust: '#E88A63',
    onRust: '#10191D',
    brass: '#D0AE5C',
  },
};

export const FONT_FAMILY = "'Source Sans 3', system-ui, 'Segoe UI', sans-serif";

export const SIZES = { body: 15, table: 13, phoneInput: 16, grid: 8, radius: 4, touchTarget: 44 } as const;

/** Widths up to this count as a phone. */
export const PHONE_MAX_PX = 640;

/** Custom properties of one mode, as written in theme.css. */
export function cssVariables(mode: ColourMode): Record<string, string> {
  const colours = COLOURS[mode];
  return {
    '--paper': colours.paper,
    '--sheet': colours.sheet,
    '--rule': colours.rule,
    '--ink': colours.ink,
    '--ink-soft': colours.inkSoft,
    ...Object.fromEntries(colours.ramp.map((colour, index) => [`--ramp-${index + 1}`, colour])),
    '--primary': colours.primary,
    '--on-primary': colours.onPrimary,
    '--rust': colours.rust,
    '--on-rust': colours.onRust,
    '--brass': colours.brass,
  };
}

import type { PartialTheme } from '@nivo/theming';
import { COLOURS, FONT_FAMILY, type ColourMode } from './tokens';

/** Nivo's theme from our tokens: hairline grid, soft axis text, ink lines. */
export function nivoTheme(mode: ColourMode): PartialTheme {
  const colours = COLOURS[mode];
  return {
    background: 'transparent',
    text: { fontFamily: FONT_FAMILY, fontSize: 13, fill: colours.ink },
    axis: {
      domain: { line: { stroke: colours.ramp[3], strokeWidth: 1 } },
      ticks: {
        line: { stroke: colours.ramp[3], strokeWidth: 1 },
        text: { fontFamily: FONT_FAMILY, fontSize: 12, fill: colours.inkSoft },
      },
      legend: { text: { fontFamily: FONT_FAMILY, fontSize: 13, fill: colours.ink } },
    },
    grid: { line: { stroke: colours.rule, strokeWidth: 1 } },
    crosshair: { line: { stroke: colours.inkSoft, strokeWidth: 1, strokeDasharray: '2 3' } },
    tooltip: {
      container: {
        background: colours.sheet,
        color: colours.ink,
        border: `1px solid ${colours.ramp[3]}`,
        borderRadius: 4,
        boxShadow: 'none',
        fontFamily: FONT_FAMILY,
        fontSize: 13,
      },
    },
  };
}

import type { ThemeConfig } from 'antd/es/config-provider';
import theme from 'antd/es/theme';
import { COLOURS, FONT_FAMILY, SIZES, type ColourMode } from './tokens';

/** Antd's theme from our tokens; `phone` raises controls to touch size and inputs to a size no browser zooms into. */
export function antdTheme(mode: ColourMode, phone: boolean): ThemeConfig {
  const colours = COLOURS[mode];
  return {
    algorithm: mode === 'dark' ? theme.darkAlgorithm : theme.defaultAlgorithm,
    token: {
      colorPrimary: colours.primary,
      colorInfo: colours.primary,
      colorSuccess: colours.primary,
      // Rust means due or overdue only, so whatever needs attention is brass, said in words beside it.
      colorWarning: colours.brass,
      colorError: colours.brass,
      colorLink: colours.primary,
      colorLinkHover: colours.ink,
      colorLinkActive: colours.ink,
      colorTextBase: colours.ink,
      colorText: colours.ink,
      colorTextHeading: colours.ink,
      colorTextSecondary: colours.inkSoft,
      colorTextTertiary: colours.inkSoft,
      colorTextDescription: colours.inkSoft,
      colorTextPlaceholder: colours.inkSoft,
      colorTextLightSolid: colours.onPrimary,
      colorBgBase: colours.sheet,
      colorBgLayout: colours.paper,
      colorBgContainer: colours.sheet,
      colorBgElevated: colours.sheet,
      // Controls need a 3:1 outline; hairlines between rows do not.
      colorBorder: colours.ramp[3],
      colorBorderSecondary: colours.rule,
      colorSplit: colours.rule,
      colorIcon: colours.inkSoft,
      fontFamily: FONT_FAMILY,
      fontSize: phone ? SIZES.phoneInput : SIZES.body,
      fontWeightStrong: 600,
      borderRadius: SIZES.radius,
      controlHeight: phone ? SIZES.touchTarget : 36,
      sizeUnit: 4,
      boxShadow: 'none',
      motion: false,
      wireframe: false,
    },
    components: {
      Button: { primaryShadow: 'none', defaultShadow: 'none', dangerShadow: 'none', fontWeight: 600 },
      Table: {
        cellFontSize: SIZES.table,
        cellFontSizeMD: SIZES.table,
        cellFontSizeSM: SIZES.table,
        headerBg: 'transparent',
        headerColor: colours.inkSoft,
        headerSplitColor: 'transparent',
        headerBorderRadius: 0,
        borderColor: colours.rule,
        rowHoverBg: colours.paper,
        headerSortActiveBg: 'transparent',
        headerSortHoverBg: colours.paper,
        bodySortBg: 'transparent',
        cellPaddingBlock: 8,
        cellPaddingInline: 8,
      },
      Tabs: { titleFontSize: SIZES.body, itemSelectedColor: colours.ink, inkBarColor: colours.ink },
      Form: { labelColor: colours.ink, verticalLabelPadding: '0 0 4px', itemMarginBottom: 20 },
    },
  };
}

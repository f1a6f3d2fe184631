import { createVuetify, type ThemeDefinition } from 'vuetify';
import { aliases, mdi } from 'vuetify/iconsets/mdi-svg';
import { darkPalette, lightPalette, type Palette } from '@/plugins/palette.ts';
import { componentDefaults } from '@/plugins/vuetify-defaults.ts';

export const LIGHT_THEME = 'limesteadLight';
export const DARK_THEME = 'limesteadDark';

function themeOf(palette: Palette, dark: boolean): ThemeDefinition {
  return {
    dark,
    colors: {
      background: palette.ground,
      'on-background': palette.ink,
      surface: palette.sheet,
      'on-surface': palette.ink,
      'surface-variant': palette.spine,
      'on-surface-variant': palette.spineInk,
      primary: palette.plum,
      'on-primary': palette.onPlum,
      secondary: palette.slate,
      success: palette.kelp,
      warning: palette.ochre,
      error: palette.brick,
      info: palette.slate,
    },
    variables: {
      ...palette,
      'border-color': palette.ink,
      'border-opacity': dark ? 0.22 : 0.18,
      'medium-emphasis-opacity': 0.78,
    },
  };
}

export function makeVuetify(cspNonce: string | undefined) {
  return createVuetify({
    theme: {
      defaultTheme: LIGHT_THEME,
      ...(cspNonce === undefined ? {} : { cspNonce }),
      themes: { [LIGHT_THEME]: themeOf(lightPalette, false), [DARK_THEME]: themeOf(darkPalette, true) },
    },
    icons: { defaultSet: 'mdi', aliases, sets: { mdi } },
    defaults: componentDefaults,
    display: { mobileBreakpoint: 900 },
  });
}

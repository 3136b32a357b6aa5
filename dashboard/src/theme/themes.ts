import {
  createDarkTheme,
  createLightTheme,
  type BrandVariants,
  type Theme,
} from '@fluentui/react-components';

/** Ink blue of the fixed state, from nearly black to nearly white. */
const brand: BrandVariants = {
  10: '#020407',
  20: '#0b1823',
  30: '#0e283f',
  40: '#113554',
  50: '#15436b',
  60: '#195183',
  70: '#1d5fa8',
  80: '#1d5fa8',
  90: '#3c77b8',
  100: '#5a8fc8',
  110: '#6ea0d6',
  120: '#7fb2ea',
  130: '#9bc3ef',
  140: '#b6d4f3',
  150: '#d1e4f8',
  160: '#ecf4fc',
};

const shared: Partial<Theme> = {
  fontFamilyBase: "'Work Sans', system-ui, sans-serif",
  fontFamilyNumeric: "'Work Sans', system-ui, sans-serif",
  borderRadiusMedium: '4px',
};
/** Fluent's grounds become our paper, so that its controls lie on it without an edge. */
const grounds: Partial<Theme> = {
  colorNeutralBackground1: 'var(--raised)',
  colorNeutralBackground2: 'var(--paper)',
  colorNeutralForeground1: 'var(--ink)',
  colorNeutralForeground2: 'var(--ink)',
  colorNeutralForeground3: 'var(--ink-soft)',
  colorNeutralForeground4: 'var(--ink-soft)',
};

export const looks = ['light', 'dark', 'contrast'] as const;
export type Look = (typeof looks)[number];

const light: Theme = { ...createLightTheme(brand), ...shared, ...grounds };
export const themes: Record<Look, Theme> = {
  light,
  dark: { ...createDarkTheme(brand), ...shared, ...grounds },
  contrast: { ...light, colorNeutralStroke1: '#000000', colorNeutralStrokeAccessible: '#000000' },
};

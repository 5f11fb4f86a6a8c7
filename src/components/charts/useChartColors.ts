import { computed } from 'vue';
import { useTheme } from 'vuetify';

export interface ChartColors {
  ink: string;
  muted: string;
  rule: string;
  paper: string;
  folded: string;
  caution: string;
  protected: string;
  tone: string;
}

/** `#rrggbb` with an opacity from 0 to 1. */
export function withAlpha(color: string, alpha: number): string {
  return `${color}${Math.round(alpha * 255)
    .toString(16)
    .padStart(2, '0')}`;
}

/** A canvas knows nothing of style sheets: the theme's roles as plain colours. */
export function useChartColors() {
  const theme = useTheme();
  return computed<ChartColors>(() => {
    const { colors } = theme.current.value;
    const of = (name: string, fallback: string): string => {
      const value = colors[name];
      return typeof value === 'string' ? value : fallback;
    };
    return {
      ink: of('ink', '#1c2a44'),
      muted: of('secondary', '#4a5875'),
      rule: of('rule', '#d8cfb8'),
      paper: of('surface', '#fdfaf2'),
      folded: of('folded', '#c2331a'),
      caution: of('caution', '#8a5a00'),
      protected: of('protected', '#1d6b5c'),
      tone: of('info', '#2d567f'),
    };
  });
}

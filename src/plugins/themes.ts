import type { ThemeDefinition } from 'vuetify';

/**
 * Paper and ink. Roles, the same in both themes: `folded` (vermilion) is kept for folded energy and nothing else,
 * `caution` (ochre) for what limits a statement, `protected` (sea-green) for what is shown to be protected.
 */
export const paperTheme: ThemeDefinition = {
  dark: false,
  colors: {
    background: '#f6f1e5',
    surface: '#fdfaf2',
    'surface-light': '#f1ead9',
    'surface-variant': '#e6dec9',
    'on-surface-variant': '#2b3a55',
    primary: '#1f3560',
    'on-primary': '#fdfaf2',
    secondary: '#4a5875',
    error: '#8a1c4a',
    info: '#2d567f',
    success: '#1d6b5c',
    warning: '#8a5a00',
    folded: '#c2331a',
    caution: '#8a5a00',
    protected: '#1d6b5c',
    ink: '#1c2a44',
    rule: '#d8cfb8',
  },
  variables: {
    'border-color': '#1c2a44',
    'border-opacity': 0.16,
    'high-emphasis-opacity': 0.94,
    'medium-emphasis-opacity': 0.78,
    'disabled-opacity': 0.5,
  },
};

export const inkTheme: ThemeDefinition = {
  dark: true,
  colors: {
    background: '#10182a',
    surface: '#172238',
    'surface-light': '#1f2c46',
    'surface-variant': '#2a3854',
    'on-surface-variant': '#e9e3d2',
    primary: '#a9c1ee',
    'on-primary': '#10182a',
    secondary: '#aab4c9',
    error: '#f0a0c0',
    info: '#9cc4ea',
    success: '#6fcbb4',
    warning: '#e0b25a',
    folded: '#ff7a5c',
    caution: '#e0b25a',
    protected: '#6fcbb4',
    ink: '#ece6d6',
    rule: '#33415e',
  },
  variables: {
    'border-color': '#ece6d6',
    'border-opacity': 0.18,
    'high-emphasis-opacity': 0.95,
    'medium-emphasis-opacity': 0.8,
    'disabled-opacity': 0.5,
  },
};

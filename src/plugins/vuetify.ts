import 'vuetify/styles';
import { createVuetify } from 'vuetify';
import { aliases, mdi } from 'vuetify/iconsets/mdi-svg';
import { inkTheme, paperTheme } from './themes';

const field = { variant: 'outlined', density: 'comfortable', hideDetails: 'auto' } as const;

export const vuetify = createVuetify({
  icons: { defaultSet: 'mdi', aliases, sets: { mdi } },
  theme: { defaultTheme: 'paper', themes: { paper: paperTheme, ink: inkTheme } },
  defaults: {
    VBtn: { variant: 'flat', rounded: 'sm' },
    VCard: { variant: 'flat', rounded: 'sm', border: true },
    VTextField: { ...field, color: 'primary' },
    VTextarea: { ...field, color: 'primary' },
    VSelect: { ...field, color: 'primary' },
    VAutocomplete: { ...field, color: 'primary' },
    VTable: { density: 'comfortable' },
    VAlert: { variant: 'tonal', border: 'start', density: 'comfortable' },
    VChip: { rounded: 'sm', size: 'small' },
  },
});

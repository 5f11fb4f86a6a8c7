import type { HelpSource } from './HelpPage';

/** Published works the help points to, each named once. */
export const helpSources = {
  welch: { authors: 'Welch', year: 1967, about: 'averaged modified periodograms' },
  harris: { authors: 'Harris', year: 1978, about: 'windows and their figures' },
  bennett: { authors: 'Bennett', year: 1948, about: 'spectra of quantised signals' },
  rife: { authors: 'Rife & Boorstyn', year: 1974, about: 'least error of a tone’s frequency' },
  kay: { authors: 'Kay', year: 1993, about: 'estimation theory' },
  lomb: { authors: 'Lomb', year: 1976, about: 'least-squares frequencies of unequally spaced data' },
  scargle: { authors: 'Scargle', year: 1982, about: 'periodogram of unevenly spaced data' },
  zechmeister: { authors: 'Zechmeister & Kürster', year: 2009, about: 'generalised periodogram with offset' },
  eyer: { authors: 'Eyer & Bartholdi', year: 1999, about: 'highest frequency of irregular sampling' },
  tropp: { authors: 'Tropp & Gilbert', year: 2007, about: 'orthogonal matching pursuit' },
  blough: { authors: 'Blough', year: 2003, about: 'time-variant Fourier transform for order tracking' },
  xia: { authors: 'Xia', year: 1999, about: 'frequencies from several undersampled waveforms' },
  bendat: { authors: 'Bendat & Piersol', year: 2010, about: 'multiple coherence' },
  carter: { authors: 'Carter', year: 1987, about: 'how coherence scatters by chance' },
  knapp: { authors: 'Knapp & Carter', year: 1976, about: 'correlation of two records for their delay' },
  burg: { authors: 'Burg, Luenberger & Wenger', year: 1982, about: 'spectra by maximum likelihood' },
  hinichWolinsky: { authors: 'Hinich & Wolinsky', year: 1988, about: 'bispectral test for aliasing' },
  hinichMesser: { authors: 'Hinich & Messer', year: 1995, about: 'principal domain of the discrete bispectrum' },
  pearl: { authors: 'Pearl', year: 1988, about: 'joining separate pieces of evidence' },
  crochiere: { authors: 'Crochiere & Rabiner', year: 1983, about: 'changing the sampling rate' },
} as const satisfies Record<string, HelpSource>;

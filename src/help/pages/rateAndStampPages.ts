import { helpSources } from '../helpSources';
import type { HelpPage } from '../HelpPage';

/** Findings about the rate, the time stamps and the companion at another rate. */
export const rateAndStampPages = {
  rateUnknown: {
    kind: 'rateUnknown',
    meaning:
      'Neither the file nor the acquisition sheet states the sampling rate. Without it there is no frequency axis and no folding frequency.',
    formulas: ['f = c · f_{s}'],
    letters: 'c: cycles per sample, all that the samples give; f_{s}: sampling rate.',
    measured: 'The file’s header, its time column and the acquisition sheet are looked at, in this order.',
    actions: {
      analyst: 'Enter the rate in the acquisition sheet: the capture is judged again at once.',
      reviewer: 'Wait for the rate. Do not guess it from the spectrum.',
    },
    limits: 'A wrong rate is worse than none: it moves every line and looks right.',
    sources: [],
    figure: 'rateScale',
  },
  rateDisagrees: {
    kind: 'rateDisagrees',
    meaning:
      'The acquisition sheet and the file state different sampling rates. Every frequency depends on which is right.',
    formulas: ['f_{true} = f_{shown} · f_{s,true} / f_{s,used}'],
    letters: 'f: frequency of a line; f_{s}: sampling rate.',
    measured: 'The rate in the sheet against that of the header or the time stamps.',
    actions: {
      analyst:
        'Find out which is right, from the recorder’s settings or from a line you know, such as the supply. Correct the sheet.',
      reviewer: 'Do not decide before this is settled.',
    },
    limits: 'A known line settles the rate only if that line is not folded itself.',
    sources: [],
    figure: 'rateScale',
  },
  timeStampGap: {
    kind: 'timeStampGap',
    meaning: 'Rows are missing from an otherwise even grid of time stamps.',
    formulas: ['missing share = 1 − N / N_{grid}'],
    letters: 'N: rows in the file; N_{grid}: places of the even grid between the first and the last stamp.',
    measured:
      'The even grid that fits most stamps is found; places without a row are counted. The stretches are left out of the spectra.',
    actions: {
      analyst: 'Look for a logger that skipped rows or an export that dropped them. Export again or record again.',
      reviewer: 'If the gaps lie away from the event, decide by the rest.',
    },
    limits: 'Rows missing from an even grid add no reach beyond the folding frequency.',
    sources: [],
    figure: 'timeStamps',
  },
  timeStampRepeated: {
    kind: 'timeStampRepeated',
    meaning:
      'Several rows carry the same time stamp: the stamps are written more coarsely than the samples were taken.',
    formulas: ['σ_{t} = rounding step / √12'],
    letters: 'σ_{t}: error of a time stamp by rounding.',
    measured: 'Equal neighbours in the time column, and the smallest step in which stamps are written.',
    actions: {
      analyst: 'Export the time with more digits. State the rate in the sheet if you know it.',
      reviewer: 'Usually nothing to decide if the mean rate is right.',
    },
    limits: 'Rows that were really recorded twice look the same.',
    sources: [],
    figure: 'timeStamps',
  },
  timeStampJitter: {
    kind: 'timeStampJitter',
    meaning:
      'The time stamps scatter about an even grid by more than the project allows. Either the samples were taken unevenly, or only the stamps were.',
    formulas: ['jitter share = std(t_{n} − n / f_{s}) · f_{s}', 'noise by jitter ≈ (2π · f · σ_{t})²'],
    letters:
      't_{n}: time stamp of row n; f_{s}: sampling rate; f: frequency of a tone; σ_{t}: jitter of the instants; the noise is relative to the tone’s power.',
    measured:
      'The stamps are compared with the even grid that fits them best. Scatter that rounding explains is only noted.',
    actions: {
      analyst: 'Use a recorder whose clock drives the converter, not the computer’s clock at each reading.',
      reviewer: 'Expect a raised floor at high frequencies. Decide by the clear-to frequency.',
    },
    limits:
      'The samples tell nothing of their own instants: if only the stamps scatter, the spectrum is better than the finding suggests.',
    sources: [],
    figure: 'timeStamps',
  },
  irregularStamps: {
    kind: 'irregularStamps',
    meaning:
      'The time stamps follow no even grid. Such a capture has no folding frequency and no band edge; a few tones can be recovered beyond half the mean rate, but nothing can be cleared.',
    formulas: ['f_{top} = min( 1 / (2p),  1 / (2π · σ_{t}),  sensor band,  computing budget )'],
    letters:
      'f_{top}: highest frequency looked at; p: largest step of which all intervals are multiples; σ_{t}: error of a time stamp.',
    measured:
      'A least-squares periodogram for uneven stamps, then tones taken out one after the other with joint refinement. Each tone is confirmed on samples that were held back; the level of false alarms comes from shuffled samples.',
    actions: {
      analyst:
        'Use the recovered tones as true frequencies, within their uncertainty. For anything else record with an even clock.',
      reviewer: 'Do not look for a clear-to frequency. Accept the tones only, or ask for a retake.',
    },
    limits:
      'Few tones over little noise are needed. A tone seen only in the pattern of the stamps themselves is not reported.',
    sources: [helpSources.lomb, helpSources.scargle, helpSources.zechmeister, helpSources.eyer, helpSources.tropp],
    figure: 'irregular',
  },
  companionMissing: {
    kind: 'companionMissing',
    meaning:
      'The acquisition sheet names a companion, a capture of the same event at another rate, but it was not at hand or could not be used. The two were not compared.',
    formulas: ['|f − n_{1} · f_{s1}| = f_{a1}   and   |f − n_{2} · f_{s2}| = f_{a2}'],
    letters:
      'f: true frequency; f_{a1}, f_{a2}: where it is found at the rates f_{s1} and f_{s2}; n_{1}, n_{2}: whole numbers.',
    measured:
      'The companion is looked up by its name. Where it is found, its common band and the places of its tones have to agree with this capture.',
    actions: {
      analyst: 'Upload the companion, or correct its name. This capture is screened again when it is there.',
      reviewer:
        'Wait for it if the verdict hangs on it: a second rate shows folded tones more surely than anything else.',
    },
    limits:
      'A companion of another event shows nothing. Two rates with a simple ratio leave some frequencies ambiguous.',
    sources: [helpSources.xia, helpSources.knapp],
    figure: 'twoRates',
  },
  foldedShare: {
    kind: 'foldedShare',
    meaning:
      'How much of this capture’s power comes from beyond the folding frequency, measured band by band: against a faster companion, or from uneven time stamps.',
    formulas: ['folded(f) = γ²(f) · G(f)', 'share = Σ folded(f) / Σ G(f)'],
    letters:
      'G: density of this capture; γ²: multiple coherence with the folded zones of the companion, between 0 (nothing in common) and 1 (all of it explained).',
    measured:
      'From the faster, simultaneous companion each zone’s folded signal is built at this rate. The part of this capture that follows those signals is the folded share, corrected for all bands and zones tried. With uneven stamps, the powers of frequency bands are estimated by maximum likelihood and confirmed on stretches held back.',
    actions: {
      analyst:
        'Use the companion’s data in the bands with a share that matters. Set filter or rate of the slower recorder for the retake.',
      reviewer:
        'Compare the share with what the user of the data can bear. Accept up to a frequency below the first band that is too high.',
    },
    limits:
      'The companion has to show the same event at the same time. Nothing shown means a share below the level printed in the finding, not zero.',
    sources: [helpSources.bendat, helpSources.carter, helpSources.burg],
    figure: 'foldedShare',
  },
} as const satisfies Record<string, HelpPage>;

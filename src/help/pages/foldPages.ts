import { helpSources } from '../helpSources';
import type { HelpPage } from '../HelpPage';

const foldLetters =
  'f: true frequency; f_{a}: where it is found; f_{s}: sampling rate; round: to the nearest whole number.';
const alias = 'f_{a} = |f − f_{s} · round(f / f_{s})|';

/** Findings about tones and orders that are, or may be, out of their place. */
export const foldPages = {
  foldedTone: {
    kind: 'foldedTone',
    meaning:
      'A line of the spectrum does not belong where it stands. It comes from a source beyond the folding frequency and was folded down by sampling. Its frequency is wrong, and no later filter removes it.',
    formulas: [alias, 'f = k · f_{s} ± f_{a},   k = 1, 2, …', 'p = 1 − exp(−2 · t · ρ)'],
    letters: `${foldLetters} p: probability of a match by chance; t: how close the match is; ρ: how many peaks there are per hertz.`,
    measured:
      'The tone’s frequency is fitted by least squares over the whole capture. It is compared with the places where the known sources, the harmonic families in the band and their multiples would land. A match counts only as far as chance does not explain it, after correction for every place that was tried. With irregular time stamps, a tone beyond half the mean rate is recovered directly.',
    actions: {
      analyst:
        'Compare the true frequency given in the finding with what was running. Ask for a retake at a rate above twice that frequency, or with a filter that stops it. Do not read the amplitude or frequency of this line.',
      reviewer:
        'Decide for a retake or exclude, unless the band that the user needs ends below the folded tone: then accept up to a frequency below it. Read the chance of a match first.',
    },
    limits:
      'At steady speed, harmonics and side bands can imitate a folded family exactly. The true frequency is the most plausible one; the list of candidates holds the others. A strong tone right below the folding frequency is no sign of folding by itself.',
    sources: [helpSources.rife, helpSources.kay],
    figure: 'foldedTone',
  },
  foldedOrder: {
    kind: 'foldedOrder',
    meaning:
      'A multiple of a shaft’s speed lies beyond the folding frequency and is seen below it. While the speed changes it moves with the wrong slope, often the wrong way.',
    formulas: ['x[n] = cos(k · φ(t_{n}) + θ)', 'f_{a}(t) = |k · f_{0}(t) − n · f_{s}|'],
    letters:
      'k: order; φ: angle of the shaft; θ: phase; f_{0}: speed in Hz; n: whole number of the zone; f_{s}: sampling rate.',
    measured:
      'Sampling folds an order’s frequency but not its law: it keeps k times the shaft’s angle. The capture is transformed over that angle, for orders below and far beyond the folding frequency, with the strong orders in band taken out first. An order counts when it stands above the background and above the mirrored law.',
    actions: {
      analyst:
        'Find the part with that order (blades, teeth, poles times speed). Plan the retake for the highest order at the highest speed of the run.',
      reviewer:
        'Look at the wrapped path on the spectrogram. Decide for a retake when the order lies in the band that matters, otherwise accept up to a frequency below its lowest place.',
    },
    limits:
      'The speed has to change: by a few tenths of a percent, or along a ramp. At a steady speed an order beyond the folding frequency and one below can land on the same place, and the capture cannot tell them apart.',
    sources: [helpSources.blough, helpSources.lomb],
    figure: 'wrappedOrder',
  },
  reflectedSweep: {
    kind: 'reflectedSweep',
    meaning:
      'A tone that sweeps in frequency turns back at the folding frequency or at 0 Hz with an unbroken phase. The part after the turn is folded.',
    formulas: ['f_{a}(t) = |f(t) − f_{s} · round(f(t) / f_{s})|'],
    letters: foldLetters,
    measured:
      'The track of the sweep is followed and carried on through the turn as one smooth law. The capture is then transformed along that law: the part beyond the folding frequency has to stand above the background and above the mirrored law.',
    actions: {
      analyst: 'Use only the part of the run before the turn, or record again at more than twice the end of the sweep.',
      reviewer:
        'Check that the track really turns at the folding frequency. Accept up to a frequency only if the folded part does not cross the band in use; otherwise ask for a retake.',
    },
    limits:
      'A sweep that only falls, two sweeps that cross, or a speed that reverses near the folding frequency is no folding. Without the turn inside the capture nothing is said.',
    sources: [helpSources.blough],
    figure: 'reflectedSweep',
  },
  ambiguousFold: {
    kind: 'ambiguousFold',
    meaning:
      'A line stands where a source in the band would stand, and also where a source beyond the folding frequency would land. This capture, with what is known beside it, cannot tell which.',
    formulas: ['n_{1} · f_{s1} ± f_{a} = n_{2} · f_{s2} ± f_{a}', 'k · f_{0} − f_{s} = −j · f_{0}'],
    letters:
      'f_{a}: where the line is found; f_{s1}, f_{s2}: the two rates; n_{1}, n_{2}: whole numbers; k, j: orders of one family with the spacing f_{0}.',
    measured:
      'The fold places of the stated sources are compared with each other and with what stands in the band. With a companion at another rate, every true frequency that both rates fold to the same place is listed.',
    actions: {
      analyst:
        'Record once more at a rate that the finding’s candidates do not share, or let the speed change by a few percent during the capture. State the sources in the acquisition sheet.',
      reviewer:
        'Do not read the line as proof either way. Ask for the second rate when the line matters; otherwise accept up to a frequency below it.',
    },
    limits:
      'Ambiguity is no evidence for folding and none against it. A longer capture at the same rate does not help.',
    sources: [helpSources.xia],
    figure: 'ambiguous',
  },
  sourceAtFold: {
    kind: 'sourceAtFold',
    meaning:
      'A source named in the acquisition sheet is a multiple of half the sampling rate. It lands exactly on 0 Hz or on the folding frequency, where its level depends on its phase. It may be strong and still not be seen.',
    formulas: ['f = m · f_{s} / 2,   m = 1, 2, …', 'x[n] = A · cos(π · m · n + θ)'],
    letters: 'f: the source; f_{s}: sampling rate; m: whole number; A: amplitude; θ: phase; n: sample number.',
    measured:
      'The frequencies in the acquisition sheet are compared with the multiples of half the rate. No sample is needed for this.',
    actions: {
      analyst: 'Record at a rate that is no simple multiple of the source: a few percent more is enough to see it.',
      reviewer: 'Do not take a missing line for a missing source. Ask for another rate if that source matters.',
    },
    limits: 'Taking out the mean also takes out what lands on 0 Hz. Nothing in the capture can bring it back.',
    sources: [],
    figure: 'sourceAtFold',
  },
  clippingHarmonics: {
    kind: 'clippingHarmonics',
    meaning:
      'Lines that look folded come from clipping in the recorder, not from a source beyond the folding frequency. Flat tops make harmonics after the filter, and these fold.',
    formulas: ['f_{k} = |k · f_{0} − f_{s} · round(k · f_{0} / f_{s})|,   k = 2, 3, 4, …'],
    letters: 'f_{0}: frequency of the clipped tone; k: number of the harmonic; f_{s}: sampling rate.',
    measured:
      'Where the capture is clipped, the places of the harmonics of its strongest tones are worked out, folded ones too. Lines at these places are explained by the clipping before any source is suspected.',
    actions: {
      analyst: 'Record again with a larger input range. A higher rate or another filter does not help.',
      reviewer: 'Treat the capture as clipped. Ask for a retake when the lines lie in the band that matters.',
    },
    limits:
      'A source beyond the folding frequency may hide under the same lines. The explanation needs the clipping to be seen in the samples; flat tops that a later filter rounded off are missed.',
    sources: [],
    figure: 'clippingHarmonics',
  },
  foldedInOtherChannel: {
    kind: 'foldedInOtherChannel',
    meaning:
      'Another channel of this capture holds a line that is shown to be folded, and this channel holds it at the same place. Both were sampled at the same instants, so it is folded here too.',
    formulas: ['|f_{1} − f_{2}| ≤ t', 'p = 1 − exp(−2 · t · ρ)'],
    letters:
      'f_{1}, f_{2}: places of the line in the two channels; t: tolerance; ρ: how many peaks there are per hertz; p: probability of a match by chance.',
    measured:
      'The place of each tone shown to be folded is looked up in the other channels, within the uncertainty of both, and corrected for all places that were tried.',
    actions: {
      analyst:
        'Read the finding of the channel named in the text: it says which source it is. Plan the retake for all channels.',
      reviewer:
        'Decide on the capture as a whole: a line folded in one channel is folded in every channel that holds it.',
    },
    limits:
      'Channels of different recorders are not compared: their clocks are not the same. The level may differ much from channel to channel.',
    sources: [helpSources.rife],
    figure: 'twoChannels',
  },
} as const satisfies Record<string, HelpPage>;

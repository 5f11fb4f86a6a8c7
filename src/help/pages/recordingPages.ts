import { helpSources } from '../helpSources';
import type { HelpPage } from '../HelpPage';

const counts = 'N: number of samples in the capture.';

/** Findings about the recording itself: what is damaged, missing or too little. */
export const recordingPages = {
  clipping: {
    kind: 'clipping',
    meaning:
      'Samples stand at the limit of the recorder: the tops of the signal are cut off. Clipping makes harmonics after the filter, and those beyond the folding frequency fold.',
    formulas: ['clipped share = N_{clipped} / N'],
    letters: `N_{clipped}: samples in flat tops; ${counts}`,
    measured:
      'Runs of samples at the extreme values, also at a limit below full scale. Clipped stretches are left out of the spectra where enough remains.',
    actions: {
      analyst: 'Record again with a larger input range. Leave headroom for the loudest event.',
      reviewer: 'If the clipped stretches were left out, decide by the rest. Otherwise ask for a retake.',
    },
    limits:
      'Tops that were rounded off by a later filter or a change of level are missed. A square wave has flat tops of its own.',
    sources: [],
    figure: 'clipped',
  },
  dropout: {
    kind: 'dropout',
    meaning:
      'The recording keeps one value far longer than the signal explains, then goes on elsewhere. Samples were lost.',
    formulas: ['missing share = N_{held} / N'],
    letters: `N_{held}: samples in held stretches; ${counts}`,
    measured:
      'Runs of one value are compared with what the signal around them does. Steps into and out of a run tell a dropout from a pause. The stretches are left out of the spectra.',
    actions: {
      analyst:
        'Look for a loose connector, a full buffer or a slow storage card. Record again when the stretches fall on the event of interest.',
      reviewer: 'See where the stretches lie. If the event is whole, decide by the rest.',
    },
    limits:
      'A signal that really rests may look alike if it starts and stops abruptly. Single lost samples are not found.',
    sources: [],
    figure: 'dropout',
  },
  offset: {
    kind: 'offset',
    meaning:
      'The signal moves about a mean well off zero. Taking out the mean also takes out anything that folds to 0 Hz.',
    formulas: ['offset share = |mean| / max |x|'],
    letters: 'x: samples of the channel.',
    measured: 'The mean and the largest value over all usable samples.',
    actions: {
      analyst: 'Check sensor bias and coupling. If a source sits at a multiple of the rate, use another rate.',
      reviewer: 'Usually nothing to decide. Watch for it when slow motion matters.',
    },
    limits:
      'An offset may be real, as a static load. It may also be a folded tone at a multiple of the rate; the capture cannot tell.',
    sources: [],
    figure: 'offset',
  },
  coarseSteps: {
    kind: 'coarseSteps',
    meaning:
      'The signal moves over only a few steps of the recorder. Rounding then makes harmonics that fold, and hides what is weaker than a step.',
    formulas: ['steps = σ / q', 'noise of rounding = q² / 12'],
    letters:
      'σ: standard deviation of the signal; q: step really used. The second formula holds only for a signal that moves over many steps.',
    measured:
      'The common step of all values is detected, also 12 bits in a 16-bit file, few digits in a text file, or a scaled recording.',
    actions: {
      analyst: 'Record again with a smaller input range or more digits in the export.',
      reviewer: 'Do not trust weak lines. Ask for a retake when the signal of interest is of the size of a few steps.',
    },
    limits:
      'Lines made by rounding may look like folded tones. A signal that is coarse by nature, as a counter, is reported too.',
    sources: [helpSources.bennett],
    figure: 'coarseSteps',
  },
  notFinite: {
    kind: 'notFinite',
    meaning: 'Some samples are no numbers: empty cells, words, or values marked as not a number or infinite.',
    formulas: ['share = N_{no number} / N'],
    letters: counts,
    measured:
      'Every value is counted while the file is read. Those stretches are left out of the spectra; nothing is filled in.',
    actions: {
      analyst:
        'Look at the rows in question: wrong column, wrong decimal sign, or a sensor fault. Correct the layout or export again.',
      reviewer: 'If the share is small and away from the event, decide by the rest.',
    },
    limits: 'A wrong column layout makes many of them and says nothing about the measurement.',
    sources: [],
    figure: 'dropout',
  },
  tooShort: {
    kind: 'tooShort',
    meaning: 'The capture holds too little signal to judge its band edge. Spectra of so few samples scatter too much.',
    formulas: ['resolution ≈ 1.5 · f_{s} / N_{segment}', 'scatter ≈ 1 / √K'],
    letters:
      'f_{s}: sampling rate; N_{segment}: samples in one segment; 1.5: noise bandwidth of the Hann window in bins; K: number of segments averaged.',
    measured:
      'Samples and duration without pauses, against the least number (256) and the project’s shortest duration.',
    actions: {
      analyst: 'Record longer. Where the event itself is short, use a rate at least ten times its highest frequency.',
      reviewer:
        'The capture shows nothing either way. Ask for a longer one, or accept on other grounds and say so in the reason.',
    },
    limits: 'Short does not mean folded. A longer capture with the same settings may be perfectly sound.',
    sources: [helpSources.harris, helpSources.welch],
    figure: 'cutShort',
  },
  silent: {
    kind: 'silent',
    meaning:
      'The channel holds one constant value, or rests in some stretches. Where there is no signal there is nothing to judge.',
    formulas: ['max x = min x'],
    letters: 'x: samples of the channel, or of the stretch.',
    measured:
      'Runs of one value. A pause into which the signal fades is told apart from a dropout by the steps into and out of it, and is left out of the spectra.',
    actions: {
      analyst: 'Check cable, channel number and gain. Record again if the channel should have carried a signal.',
      reviewer: 'Exclude an unused channel. For pauses there is nothing to decide.',
    },
    limits: 'Silence does not show that the chain was protected: it was not put to the test.',
    sources: [],
    figure: 'silent',
  },
  truncatedFile: {
    kind: 'truncatedFile',
    meaning:
      'The file ends before the length it states, or in the middle of a sample. What is there has been screened.',
    formulas: ['missing = N_{stated} − N_{present}'],
    letters: 'N_{stated}: samples that the file announces; N_{present}: samples that it holds.',
    measured: 'The structure of the file is compared with its size.',
    actions: {
      analyst:
        'Copy the file again from the recorder and upload it in place of this one. If it is short there too, check how the recording ended.',
      reviewer: 'Decide by what is there only if the event lies in it.',
    },
    limits: 'The judgement speaks of the part that is present.',
    sources: [],
    figure: 'cutShort',
  },
} as const satisfies Record<string, HelpPage>;

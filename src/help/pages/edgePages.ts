import { helpSources } from '../helpSources';
import type { HelpPage } from '../HelpPage';

const densities =
  'G: density of the capture; g: density behind the filter, before sampling; f_{s}: sampling rate; f_{s}/2: folding frequency.';

/** Findings about the band edge: what is left of the signal next to the folding frequency. */
export const edgePages = {
  edgeFollowsSource: {
    kind: 'edgeFollowsSource',
    meaning:
      'The level next to the folding frequency grows and fades with the signal. So there is signal at the edge, not only a converter’s floor: the source goes on beyond the folding frequency and folds in.',
    formulas: ['edge(t) = floor + b · inband(t)', 'b > 0 with its confidence: follows'],
    letters:
      'edge: level next to f_{s}/2 in each frame; inband: level of the band in the same frame; b: how far one follows the other.',
    measured:
      'Edge and band are measured frame by frame and fitted by weighted least squares. The folded share that this implies has to matter: where the edge lies far below all the power there is, following is not used against the capture.',
    actions: {
      analyst:
        'Check whether the anti-alias filter was in place and set for this rate. Record again with a filter, or at a higher rate.',
      reviewer:
        'Look at the spectrum: there is no skirt. Ask for a retake, or accept up to the clear-to frequency if one is given.',
    },
    limits:
      'Where the level in the band varies by less than 6 dB nothing can be said. A resonance at the edge or a filter with a gentle slope follows as well: then little may have folded, and the contamination bound says how much at most.',
    sources: [helpSources.welch, helpSources.kay],
    figure: 'edgeOverTime',
  },
  bandEdgeUnprotected: {
    kind: 'bandEdgeUnprotected',
    meaning:
      'The guard band below the folding frequency holds much energy, or the density hardly falls towards it. A capture with a working anti-alias filter holds little there.',
    formulas: ['share = 10 · lg ( P(guard · f_{s}/2 … f_{s}/2) / P(0 … f_{s}/2) )', 'skirt = G_{band} − G_{edge}'],
    letters: `P: power in a stretch; guard: start of the guard band (a threshold); ${densities}`,
    measured:
      'Averaged spectra (overlapping Hann segments). Tones are taken out first, so that a tone near the edge is not taken for a missing filter. The share and the fall of the density are compared with the project’s thresholds. The finding also stands when other signs leave a high fold score.',
    actions: {
      analyst:
        'State the filter in the acquisition sheet if there was one. For the retake use a filter with its corner lower, or a higher rate.',
      reviewer: 'Use the clear-to frequency. If the band in use reaches into the guard band, ask for a retake.',
    },
    limits:
      'Flat sensor noise fills the guard band as well. The finding says that the edge does not protect; it does not say that something has folded.',
    sources: [helpSources.welch, helpSources.harris],
    figure: 'skirt',
  },
  contaminationBound: {
    kind: 'contaminationBound',
    meaning:
      'The largest density that may have folded back anywhere in the band, under the assumption printed with it. What stands well above this bound cannot be folded energy.',
    formulas: [
      'G(f_{s}/2) = 2 · Σ_{j ≥ 0} g((2j + 1) · f_{s}/2)',
      'folded(f) ≤ G(f_{s}/2)',
      'with a known filter:  folded(f) ≤ ½ · G(f_{s}/2) · Σ_{k} [ a(k · f_{s} − f) + a(k · f_{s} + f) ]',
    ],
    letters: `${densities} a: attenuation of the filter relative to f_{s}/2; k: whole number of the image.`,
    measured:
      'The mean density next to the folding frequency, at the upper end of its confidence interval. If the sheet describes the filter, only its attenuation beyond that at the folding frequency is taken off.',
    actions: {
      analyst:
        'Enter filter and sensor resonance in the sheet: the first lowers the bound, the second keeps it honest.',
      reviewer:
        'Read the assumption. If you know of a source or resonance beyond the folding frequency, do not rely on the bound.',
    },
    limits:
      'It holds only if the density does not increase beyond the folding frequency. Sensor resonances and tones out there break it; with a resonance in the sheet a gain is added.',
    sources: [helpSources.welch],
    figure: 'bound',
  },
  clearTo: {
    kind: 'clearTo',
    meaning:
      'Up to this frequency the signal stands above the largest possible contamination by at least the project’s protection. It is the one number that a user of the data needs.',
    formulas: ['G(f) ≥ bound(f) + protection   for all f from the lowest of interest up to the clear-to frequency'],
    letters: `${densities} bound: the contamination bound; protection: a threshold, in dB.`,
    measured:
      'The mean density, smoothed over a fortieth of the rate, is followed upwards from the lowest frequency of interest, valleys included. The stretch ends at the first place that is too low, and below any tone shown to be folded.',
    actions: {
      analyst: 'Use the data up to this frequency and state it in the report. If you need more, plan a retake.',
      reviewer: 'Accept if the band in use lies below it; otherwise accept up to this frequency or ask for a retake.',
    },
    limits:
      'It rests on the assumption of the contamination bound. A deep valley in a good spectrum ends the stretch early: that is caution, not evidence of folding.',
    sources: [helpSources.welch],
    figure: 'bound',
  },
  noRollOff: {
    kind: 'noRollOff',
    meaning:
      'Nowhere does the signal stand far enough above the largest contamination that the band edge allows. No roll-off is visible that would show a filter at work.',
    formulas: ['max_{f} ( G(f) − bound(f) ) < protection'],
    letters: `${densities} bound: the contamination bound; protection: a threshold, in dB.`,
    measured: 'The smoothed mean density is compared with the contamination bound over the band of interest.',
    actions: {
      analyst:
        'State the filter in the sheet if there was one. Check whether the data were decimated by dropping samples. For the retake: a filter, or a rate so high that the signal has died away at the edge.',
      reviewer: 'Do not accept on this evidence alone. Ask for a retake or a companion at a higher rate.',
    },
    limits:
      'Broadband noise with a steep converter filter right at the edge can look the same. No roll-off means unproven, not folded.',
    sources: [helpSources.welch],
    figure: 'skirt',
  },
  noiseFloorLimits: {
    kind: 'noiseFloorLimits',
    meaning:
      'The upper half of the band is a flat, steady floor. It may be noise of sensor or converter, or folded noise; the capture cannot tell. The floor caps what can be cleared.',
    formulas: ['S_{q} = q² / (6 · f_{s})', 'SNR = 6.02 · B + 1.76 dB'],
    letters:
      'S_{q}: one-sided density of rounding noise; q: step really used; f_{s}: sampling rate; B: bits; SNR: of a full-scale sine.',
    measured:
      'Flatness over frequency and steadiness over time of the upper half. The step really used is detected from the values and gives the lowest floor possible.',
    actions: {
      analyst:
        'Enter the noise floor of the sensor chain in the sheet if you know it. Use a smaller input range next time.',
      reviewer: 'Decide by the clear-to frequency. The weaker the signal above its floor, the less can be cleared.',
    },
    limits:
      'With 20 dB between signal and floor, no capture can be cleared at a protection of 40 dB without help from the sheet.',
    sources: [helpSources.bennett, helpSources.welch],
    figure: 'floor',
  },
  overSampled: {
    kind: 'overSampled',
    meaning:
      'The signal ends far below the folding frequency. The true bandwidth is lower than the rate suggests, and a lower rate would do.',
    formulas: ['f_{top} = highest f with G(f) > max G − 60 dB', 'f_{s} > 2 · f_{top}'],
    letters: `f_{top}: true bandwidth; ${densities}`,
    measured:
      'The smoothed averaged density is followed down from the edge until it comes within 60 dB of its highest value.',
    actions: {
      analyst: 'Nothing to repair. A lower rate saves storage; keep a margin for the filter’s slope.',
      reviewer: 'Nothing to decide. If more bandwidth was expected, ask which filter or sensor limited it.',
    },
    limits:
      'The cliff shows where the last filter was. What folded before that filter, in an earlier stage, is not excluded by it.',
    sources: [helpSources.welch],
    figure: 'overSampled',
  },
  rateRaised: {
    kind: 'rateRaised',
    meaning:
      'The capture was recorded at a lower rate and raised afterwards, by repeating or joining samples or with a filter. Its true bandwidth is that of the first recording, and so is its folding frequency.',
    formulas: ['x[L · n + i] = x[L · n],   i < L', 'G(f_{p} + v) ~ G(f_{p} − v)'],
    letters:
      'L: factor of the rate; i, n: places of samples; f_{p}: half the old rate, the pivot; v: distance from it; G: density.',
    measured:
      'First and second differences of the samples, by place modulo the factor; the log density against its own mirror; and the steepest fall within a narrow stretch of frequency.',
    actions: {
      analyst: 'Find the file as it was recorded and upload that one. State its rate in the sheet.',
      reviewer: 'Judge the capture by its old folding frequency. The present rate tells nothing about its protection.',
    },
    limits:
      'Raising the rate is no folding in itself, so this alone never leads to the verdict folded. A cliff may also be a filter that was simply set low.',
    sources: [helpSources.crochiere],
    figure: 'mirror',
  },
  methodsDisagree: {
    kind: 'methodsDisagree',
    meaning:
      'Two methods answer differently. One example: the band edge allows hardly any folded energy, and yet a tone is shown to be folded. Then an assumption of one of them does not hold.',
    formulas: ['shown folded power > bound'],
    letters:
      'bound: largest folded power that the band edge allows if the source does not increase beyond the folding frequency.',
    measured: 'The folded components and the companion’s answer are compared with what the band edge says.',
    actions: {
      analyst:
        'Look for a resonance or a strong tone beyond the folding frequency and enter it in the sheet. Check that a companion shows the same event.',
      reviewer: 'Look at both pieces of evidence before deciding. What is shown to be folded outweighs a clean edge.',
    },
    limits: 'The finding does not say which method is right. It says that one assumption fails.',
    sources: [helpSources.pearl],
    figure: 'resonance',
  },
  outerTriangle: {
    kind: 'outerTriangle',
    meaning:
      'Triples of frequencies hang together that can do so only by way of the sampling rate. It supports folded energy and proves nothing alone.',
    formulas: [
      'B(f_{1}, f_{2}) = E[ X(f_{1}) · X(f_{2}) · X*(f_{1} + f_{2}) ]',
      'outer triangle:  f_{1} + f_{2} > f_{s}/2',
    ],
    letters: 'B: bispectrum; X: spectrum of one segment; E: mean over segments; *: conjugate; f_{s}: sampling rate.',
    measured:
      'The bispectrum in the outer triangle is compared with surrogates that have the same spectrum without the connection. It is run only on broadband captures and reported with a check that they are steady over their segments.',
    actions: {
      analyst: 'Use it together with the band edge and the tones. A companion at a higher rate settles the question.',
      reviewer: 'Do not decide on this alone. It may tip the scale where the band edge looks unprotected as well.',
    },
    limits:
      'A signal that changes over time fills the outer triangle without any folding. Symmetric noise leaves it empty even when folded: zero proves nothing. Not run on clipped, coarsely quantised, tonal or transient captures.',
    sources: [helpSources.hinichWolinsky, helpSources.hinichMesser],
    figure: 'triangle',
  },
} as const satisfies Record<string, HelpPage>;

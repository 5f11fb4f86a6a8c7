import { thresholdInfo } from '@shared/schemas/thresholds.js';
import { verdicts } from '@shared/schemas/screening.js';
import { verdictFaces } from '@/utils/verdictFaces';
import { helpSources } from './helpSources';
import type { HelpSource } from './HelpPage';

/** Something that is no finding, but has to be understood to read one. */
export interface HelpTopic {
  slug: string;
  title: string;
  paragraphs: string[];
  formulas: string[];
  terms: { term: string; text: string }[];
  sources: HelpSource[];
}

const shown = (info: { defaultValue: number | boolean; unit: string }): string =>
  typeof info.defaultValue === 'boolean'
    ? info.defaultValue
      ? 'on'
      : 'off'
    : `${info.defaultValue}${info.unit ? ` ${info.unit}` : ''}`;

export const helpTopics: HelpTopic[] = [
  {
    slug: 'verdicts',
    title: 'Verdicts',
    paragraphs: [
      'A verdict sums up the findings of a capture. The first of these that applies counts: folded, unproven, limited, clear. The worst channel decides for the capture.',
      'Folded needs a finding that shows folded energy with the confidence that the project asks for. Unproven is a right answer with a reason: the findings say what the capture cannot show.',
    ],
    formulas: [],
    terms: verdicts.map((verdict) => ({ term: verdictFaces[verdict].label, text: verdictFaces[verdict].meaning })),
    sources: [],
  },
  {
    slug: 'clear-to-frequency',
    title: 'Clear-to frequency',
    paragraphs: [
      'Up to the clear-to frequency the signal stands above the largest contamination that the capture allows, by at least the project’s protection. Use the data up to there and state the number with them.',
      'It ends below every tone shown to be folded. It is empty where not even the lowest frequencies are protected, or where the rate is unknown or the stamps are irregular.',
      'The finding “Clear-to frequency” has its own page with the figure.',
    ],
    formulas: ['G(f) ≥ bound(f) + protection   from the lowest frequency of interest upwards, unbroken'],
    terms: [
      { term: 'Protection', text: thresholdInfo.requiredProtectionDb.help },
      { term: 'Band of interest', text: thresholdInfo.rateFactor.help },
    ],
    sources: [helpSources.welch],
  },
  {
    slug: 'fold-score',
    title: 'Fold score',
    paragraphs: [
      'The fold score is a probability between 0 and 1: that the folded energy below nine tenths of the folding frequency is more than a ten-thousandth (−40 dB) of the total. It puts captures in order, so that the most suspicious ones are looked at first.',
      'It assumes that half of all captures are folded. Where fewer are, the same evidence means less.',
      'A score is no proof. The verdict folded comes from findings that show folding, not from the score.',
    ],
    formulas: ['odds = (share / (1 − share)) · e^{LLR}', 'score = odds / (1 + odds)'],
    terms: [
      { term: 'share', text: 'share of folded captures assumed beforehand: one half' },
      { term: 'LLR', text: 'natural logarithm of how much better “folded” explains the evidence than “not folded”' },
    ],
    sources: [helpSources.pearl],
  },
  {
    slug: 'thresholds',
    title: 'Thresholds',
    paragraphs: [
      'Thresholds belong to a project. A change is kept with name, time and reason, and the stored measurements are judged again without touching the captures.',
    ],
    formulas: [],
    terms: Object.values(thresholdInfo).map((info) => ({
      term: `${info.label} (default ${shown(info)})`,
      text: info.help,
    })),
    sources: [],
  },
];

import type { Finding, Tone, Verdict } from '../../../shared/schemas/screening.js';
import type { LabelledCapture } from '../sets/LabelledCapture.js';
import type { SimpleLevels } from '../simple/simpleMethods.js';

/** What a thread is asked to do: one file, with the other of its pair. */
export interface BenchTask {
  path: string;
  file: string;
  companion: { path: string; name: string } | null;
}

/** The screening of one capture, as plain data that passes between threads. */
export interface BenchResult {
  /** Why it could not be screened. */
  failure: string | null;
  verdict: Verdict | null;
  headline: string | null;
  foldScore: number | null;
  logRatio: number | null;
  prior: number;
  clearToHz: number | null;
  protectionDb: number;
  durationS: number | null;
  /** Of the first channel: the labels speak of one signal. */
  tones: Pick<Tone, 'frequencyHz' | 'explanation' | 'trueFrequencyHz' | 'confidence'>[];
  findings: Pick<Finding, 'kind' | 'severity' | 'confidence' | 'evidence' | 'text'>[];
  /** null where the stamps are irregular, the rate is unknown or there is too little of it. */
  simple: SimpleLevels | null;
  elapsedMs: number;
}

export interface ScreenedCapture extends BenchResult {
  truth: LabelledCapture;
}

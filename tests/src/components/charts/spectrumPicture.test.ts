import type { Tone } from '@shared/schemas/screening.js';
import { describe, expect, it } from 'vitest';
import { buildSpectrumAnnotations } from '@/components/charts/buildSpectrumAnnotations';
import { buildSpectrumDatasets } from '@/components/charts/buildSpectrumDatasets';
import { describeSpectrum } from '@/components/charts/describeSpectrum';
import type { SpectrumModel } from '@/components/charts/SpectrumModel';

const colors = {
  ink: '#000001',
  muted: '#000002',
  rule: '#000003',
  paper: '#000004',
  folded: '#c2331a',
  caution: '#000005',
  protected: '#000006',
  tone: '#000007',
};
const tone = (frequencyHz: number, changes: Partial<Tone> = {}): Tone => ({
  frequencyHz,
  uncertaintyHz: 0.1,
  levelDb: -20,
  standsOutDb: 30,
  explanation: 'unexplained',
  confidence: 0.99,
  ...changes,
});
const folded = tone(300, { explanation: 'foldedSource', trueFrequencyHz: 700 });

function model(changes: Partial<SpectrumModel['screen']> = {}): SpectrumModel {
  return {
    isLogarithmic: false,
    spectrum: {
      channel: 0,
      kind: 'survey',
      unit: 'g',
      sampleRateHz: 1000,
      foldingFrequencyHz: 500,
      resolutionHz: 100,
      segments: 8,
      frequencyHz: [0, 100, 200, 300, 400, 500],
      densityDb: [-90, -80, -70, -30, -70, -80],
      medianDb: null,
    } as SpectrumModel['spectrum'],
    screen: {
      schema: 'overfold.screen/1',
      file: 'a.wav',
      channel: 0,
      sampleRateHz: 1000,
      samples: 10_000,
      durationS: 10,
      verdict: 'folded',
      foldScore: 0.9,
      foldLogLikelihoodRatio: 2,
      foldPrior: 0.1,
      clearToHz: 120,
      protectionDb: 40,
      contaminationBoundDb: null,
      bandOfInterestHz: [0, 390],
      guardStartHz: 400,
      bandEdge: { skirtDb: null, edgeAboveFloorDb: null, guardShareDb: null },
      tones: [folded, tone(200)],
      findings: [],
      engine: { version: '1', elapsedMs: 1 },
      ...changes,
    },
  };
}

describe('buildSpectrumAnnotations', () => {
  it('says beside a folded tone where it belongs and in which zone', () => {
    const annotations = buildSpectrumAnnotations(model(), colors);
    expect(annotations.folded0).toMatchObject({
      xMin: 300,
      borderColor: colors.folded,
      label: { content: 'belongs at 700 Hz (zone 2) →' },
    });
    expect(annotations).not.toHaveProperty('folded1');
  });

  it('draws the clear-to frequency and the protected stretch up to it', () => {
    const annotations = buildSpectrumAnnotations(model(), colors);
    expect(annotations.clearTo).toMatchObject({ xMin: 120, label: { content: 'clear to 120 Hz' } });
    expect(annotations.protectedStretch).toMatchObject({ xMin: 0, xMax: 120 });
  });

  it('draws neither where no frequency is clear', () => {
    const annotations = buildSpectrumAnnotations(model({ clearToHz: null }), colors);
    expect(annotations).not.toHaveProperty('clearTo');
    expect(annotations).not.toHaveProperty('protectedStretch');
    expect(annotations).toHaveProperty('folding');
  });

  it('keeps the signal colour for folded tones', () => {
    const { folded0, ...others } = buildSpectrumAnnotations(model(), colors);
    expect(JSON.stringify(folded0)).toContain(colors.folded);
    expect(JSON.stringify(others)).not.toContain(colors.folded);
  });
});

describe('buildSpectrumDatasets', () => {
  it('marks folded tones with a triangle on the line and others with a shape of their own', () => {
    const datasets = buildSpectrumDatasets(model(), colors);
    expect(datasets.map(({ label }) => label)).toEqual(['Density', 'Folded source', 'Unexplained']);
    expect(datasets[1]).toMatchObject({
      pointStyle: 'triangle',
      borderColor: colors.folded,
      data: [{ x: 300, y: -30 }],
    });
    expect(datasets[2]).toMatchObject({ pointStyle: 'cross', borderColor: colors.tone });
  });

  it('leaves 0 Hz out of a logarithmic axis', () => {
    const [density] = buildSpectrumDatasets({ ...model(), isLogarithmic: true }, colors);
    expect(density?.data).toHaveLength(5);
  });
});

describe('describeSpectrum', () => {
  it('tells the clear-to frequency and every folded tone with its true place', () => {
    const text = describeSpectrum(model());
    expect(text).toContain('Clear up to 120 Hz at 40 dB protection.');
    expect(text).toContain('2 tones stand out, 1 of them folded.');
    expect(text).toContain('Folded tone at 300 Hz, -20.0 dB, belongs at 700 Hz.');
  });

  it('says so where no frequency is shown to be clear', () => {
    expect(describeSpectrum(model({ clearToHz: null }))).toContain('No frequency is shown to be clear.');
  });
});

import { describe, expect, it } from 'vitest';
import { helpFigures } from '@/help/figures/helpFigures';
import type { FigurePoint, FigureShape } from '@/help/figures/HelpFigure';
import { helpPages } from '@/help/helpPages';

const pointsOf = (shape: FigureShape): readonly FigurePoint[] => {
  if (shape.shape === 'arrow') return [shape.from, shape.to];
  return shape.shape === 'label' ? [shape.at] : shape.points;
};

describe.each(Object.entries(helpFigures))('figure %s', (name, draw) => {
  it('is drawn inside its axes, always the same', () => {
    const figure = draw();
    expect(draw()).toEqual(figure);
    const points = figure.shapes.flatMap(pointsOf);
    expect(points.length).toBeGreaterThan(1);
    const outside = points.filter(
      ([x, y]) =>
        !(x >= figure.xRange[0] && x <= figure.xRange[1]) || !(y >= figure.yRange[0] && y <= figure.yRange[1]),
    );
    expect(outside).toEqual([]);
  });

  it('says in words what there is to see, and is used by a page', () => {
    const { title, description } = draw();
    expect(title.length).toBeGreaterThan(5);
    expect(description).toMatch(/^[A-Z].{40,}[.]$/);
    expect(description).not.toMatch(/NaN|undefined/);
    expect(Object.values(helpPages).some(({ figure }) => figure === name)).toBe(true);
  });
});

describe('figures of folding', () => {
  const lands = (name: keyof typeof helpFigures): string => helpFigures[name]().description;

  // Worked by hand: |f − fs·round(f/fs)|.
  it('draw folded tones where the fold arithmetic puts them', () => {
    expect(lands('foldedTone')).toContain('a tone at 640 Hz (dashed) is found at 360 Hz');
    expect(lands('ambiguous')).toContain('452 Hz and one at 4548 Hz');
    expect(lands('twoRates')).toContain('220 Hz at 1000 Hz and at 500 Hz at 1280 Hz');
    expect(lands('clippingHarmonics')).toContain('fold to 370 and 190 Hz');
  });

  it('keep the signal colour for folded energy: no figure without it uses it', () => {
    const withFolded = Object.entries(helpFigures).filter(([, draw]) =>
      draw().shapes.some(({ role }) => role === 'folded'),
    );
    expect(withFolded.map(([name]) => name).toSorted()).toEqual([
      'clippingHarmonics',
      'edgeOverTime',
      'foldedShare',
      'foldedTone',
      'reflectedSweep',
      'resonance',
      'twoChannels',
      'twoRates',
      'wrappedOrder',
    ]);
  });
});

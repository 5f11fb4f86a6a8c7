import { describe, expect, it } from 'vitest';
import { findingKinds } from '@shared/schemas/screening.js';
import { helpGroups, helpPages } from '@/help/helpPages';
import { helpTopics } from '@/help/helpTopics';

const texts = (value: unknown): string[] =>
  typeof value === 'string' ? [value] : Object.values((value ?? {}) as object).flatMap(texts);

describe('helpPages', () => {
  it.each(findingKinds)('explain %s in every part', (kind) => {
    const page = helpPages[kind];
    expect(page.kind).toBe(kind);
    for (const part of [page.meaning, page.measured, page.actions.analyst, page.actions.reviewer, page.limits])
      expect(part).toMatch(/^[A-Z].{30,}[.]$/);
    expect(page.formulas.length).toBeGreaterThan(0);
    expect(page.letters).not.toBe('');
  });

  it('show every kind in exactly one group of the overview', () => {
    const listed = helpGroups.flatMap(({ pages }) => pages.map(({ kind }) => kind));
    expect(listed.toSorted()).toEqual(findingKinds.toSorted());
  });

  it('keep the short notation of formulas to formulas and letters', () => {
    for (const { meaning, measured, actions, limits } of Object.values(helpPages))
      expect(texts({ meaning, measured, actions, limits }).filter((text) => /[_^]\{/.test(text))).toEqual([]);
  });
});

describe('helpTopics', () => {
  it('have an address of their own that is no finding kind', () => {
    const slugs = helpTopics.map(({ slug }) => slug);
    expect(new Set([...slugs, ...findingKinds]).size).toBe(slugs.length + findingKinds.length);
    expect(slugs).toEqual(['verdicts', 'clear-to-frequency', 'fold-score', 'thresholds']);
  });

  it.each(helpTopics)('explain $title', ({ paragraphs, terms }) => {
    for (const text of texts({ paragraphs, terms })) expect(text.length).toBeGreaterThan(2);
    expect(paragraphs.length).toBeGreaterThan(0);
  });
});

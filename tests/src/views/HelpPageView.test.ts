import { describe, expect, it } from 'vitest';
import { cautionText } from '@shared/constants/cautions.js';
import { findingKinds, type Finding } from '@shared/schemas/screening.js';
import FindingItem from '@/components/findings/FindingItem.vue';
import { findingLabels } from '@/components/findings/findingFaces';
import HelpOverview from '@/components/help/HelpOverview.vue';
import { helpPages } from '@/help/helpPages';
import { helpTopics } from '@/help/helpTopics';
import HelpPageView from '@/views/HelpPageView.vue';
import { mountWithPlugins } from '../../support/client/mountWithPlugins';

const pageOf = (page: string) => mountWithPlugins(HelpPageView, { props: { page } });

describe('HelpPageView', () => {
  it.each(findingKinds)('shows %s with its figure, actions, sources and the cautions', (kind) => {
    const wrapper = pageOf(kind);
    const page = helpPages[kind];
    expect(wrapper.find('h1').text()).toBe(findingLabels[kind]);
    expect(document.title).toContain(findingLabels[kind]);
    for (const text of [page.meaning, page.measured, page.actions.analyst, page.actions.reviewer, page.limits])
      expect(wrapper.text()).toContain(text);
    for (const { authors, year } of page.sources) expect(wrapper.text()).toContain(`${authors} (${year})`);
    expect(wrapper.text()).toContain(cautionText);
    expect(wrapper.text()).not.toMatch(/[_^]\{/);
  });

  it('gives each figure a name and a description that readers of the page hear', () => {
    const image = pageOf('foldedTone').find('svg[role="img"]');
    const ids = (image.attributes('aria-labelledby') ?? '').split(' ');
    expect(ids).toHaveLength(2);
    for (const id of ids) expect(document.getElementById(id)?.textContent?.length).toBeGreaterThan(5);
  });

  it.each(helpTopics)('shows the page about $slug', ({ slug, title, paragraphs }) => {
    const wrapper = pageOf(slug);
    expect(wrapper.find('h1').text()).toBe(title);
    expect(wrapper.text()).toContain(paragraphs[0]);
  });

  it('says so where there is no such page', () => {
    expect(pageOf('toString').find('h1').text()).toBe('There is no such help page');
  });
});

describe('links to the help', () => {
  it('lead from the overview to every kind and topic', () => {
    const hrefs = mountWithPlugins(HelpOverview)
      .findAll('a')
      .map((link) => link.attributes('href'));
    const pages = [...helpTopics.map(({ slug }) => slug), ...findingKinds];
    expect(hrefs.toSorted()).toEqual(pages.map((page) => `/help/${page}`).toSorted());
  });

  it('lead from a finding to the page of its kind', () => {
    const finding: Finding = {
      kind: 'clipping',
      severity: 'limit',
      confidence: 1,
      text: 'Samples are clipped.',
      evidence: {},
      method: 'count over all samples',
    };
    const link = mountWithPlugins(FindingItem, { props: { finding } }).find('a');
    expect(link.attributes('href')).toBe('/help/clipping');
    expect(link.attributes('aria-label')).toBe('What this means: Clipping');
  });
});

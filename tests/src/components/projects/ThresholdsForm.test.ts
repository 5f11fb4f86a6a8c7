import { defaultThresholds } from '@shared/schemas/thresholds.js';
import { describe, expect, it } from 'vitest';
import ThresholdsForm from '@/components/projects/ThresholdsForm.vue';
import { mountWithPlugins } from '../../../support/client/mountWithPlugins';

async function changed(guardStart: string) {
  const wrapper = mountWithPlugins(ThresholdsForm, {
    props: { projectId: 'p1', values: defaultThresholds, canEdit: true },
  });
  await wrapper.find('.reason input').setValue('New logger');
  await wrapper.find('input[aria-label="Guard band starts at"]').setValue(guardStart);
  return {
    isBlocked: wrapper.find('button[type=submit]').attributes('disabled') !== undefined,
    problems: wrapper.findAll('.v-messages__message').map((message) => message.text()),
  };
}

describe('ThresholdsForm', () => {
  it('names what is wrong with a value out of range and does not save it', async () => {
    const { isBlocked, problems } = await changed('1.5');
    expect(isBlocked).toBe(true);
    expect(problems.join()).toContain('0.98');
  });

  it('asks for a number where a value is emptied', async () => {
    const { isBlocked, problems } = await changed('');
    expect(isBlocked).toBe(true);
    expect(problems).toContain('Enter a number.');
  });

  it('saves a changed value within its range', async () => {
    const { isBlocked, problems } = await changed('0.75');
    expect(isBlocked).toBe(false);
    expect(problems).toEqual([]);
  });
});

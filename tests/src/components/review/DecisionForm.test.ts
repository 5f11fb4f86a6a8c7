import { describe, expect, it } from 'vitest';
import DecisionForm from '@/components/review/DecisionForm.vue';
import { mountWithPlugins } from '../../../support/client/mountWithPlugins';

const form = (clearToHz: number | null) =>
  mountWithPlugins(DecisionForm, { props: { clearToHz, version: 3, isBusy: false, problem: '' } });
type Form = ReturnType<typeof form>;

const isBlocked = (wrapper: Form): boolean => wrapper.find('button[type=submit]').attributes('disabled') !== undefined;
const choose = (wrapper: Form, kind: string) => wrapper.find(`input[type=radio][value=${kind}]`).setValue(true);
const giveReason = (wrapper: Form) => wrapper.find('textarea').setValue('Seen on site');

describe('DecisionForm', () => {
  it('cannot be saved before a decision and a reason are given', async () => {
    const wrapper = form(null);
    expect(isBlocked(wrapper)).toBe(true);
    await choose(wrapper, 'accept');
    expect(isBlocked(wrapper)).toBe(true);
    await giveReason(wrapper);
    expect(isBlocked(wrapper)).toBe(false);
    await wrapper.find('form').trigger('submit');
    expect(wrapper.emitted('decide')).toEqual([[{ decision: 'accept', reason: 'Seen on site', version: 3 }]]);
  });

  it('asks for a limit to accept up to', async () => {
    const wrapper = form(null);
    await choose(wrapper, 'acceptTo');
    await giveReason(wrapper);
    expect(isBlocked(wrapper)).toBe(true);
    await wrapper.find('input[inputmode=decimal]').setValue('310,5');
    expect(isBlocked(wrapper)).toBe(false);
    await wrapper.find('form').trigger('submit');
    expect(wrapper.emitted('decide')?.[0]).toEqual([
      { decision: 'acceptTo', limitHz: 310.5, reason: 'Seen on site', version: 3 },
    ]);
  });

  it('proposes the clear-to frequency rounded down', async () => {
    const wrapper = form(319);
    await choose(wrapper, 'acceptTo');
    expect(wrapper.find<HTMLInputElement>('input[inputmode=decimal]').element.value).toBe('310');
  });
});

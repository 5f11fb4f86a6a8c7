import { describe, expect, it } from 'vitest';
import CaptureCompanion from '@/components/captures/CaptureCompanion.vue';
import { mountWithPlugins } from '../../../support/client/mountWithPlugins';

const id = '11111111-1111-4111-8111-111111111111';
const companion = { id, fileName: 'run-1/fast.wav', sampleRateHz: 1280, isCompared: true };
const shown = (capture: object) => mountWithPlugins(CaptureCompanion, { props: { capture } });

describe('CaptureCompanion', () => {
  it('leads to the capture that was compared, and names its rate', () => {
    const wrapper = shown({ companion, companionNote: null });
    expect(wrapper.find('a').attributes('href')).toBe(`/captures/${id}`);
    expect(wrapper.text()).toBe('Compared with run-1/fast.wav, 1280 Hz');
  });

  it('says why a companion was not compared', () => {
    const wrapper = shown({
      companion: { ...companion, sampleRateHz: null, isCompared: false },
      companionNote: 'The companion run-1/fast.wav could not be screened itself.',
    });
    expect(wrapper.text()).toContain('Not compared with run-1/fast.wav');
    expect(wrapper.text()).toContain('could not be screened itself');
  });

  it('says what is waited for where there is no companion yet, and nothing where none is asked for', () => {
    const missing = 'The companion fast.wav is not uploaded yet. Once it is, this capture is screened again.';
    expect(shown({ companion: null, companionNote: missing }).text()).toBe(missing);
    expect(shown({ companion: null, companionNote: null }).text()).toBe('');
  });
});

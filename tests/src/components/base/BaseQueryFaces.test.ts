import { describe, expect, it } from 'vitest';
import { ApiError } from '@/api/ApiError';
import BaseQueryFaces from '@/components/base/BaseQueryFaces.vue';
import { mountWithPlugins } from '../../../support/client/mountWithPlugins';

const faces = (props: Record<string, unknown>) =>
  mountWithPlugins(BaseQueryFaces, {
    props: { isLoading: false, error: null, ...props },
    slots: { default: 'the list' },
  });

describe('BaseQueryFaces', () => {
  it('says that it is loading', () => {
    const wrapper = faces({ isLoading: true });
    expect(wrapper.find('[role=status]').text()).toContain('Loading');
    expect(wrapper.text()).not.toContain('the list');
  });

  it('shows the error with its reference and asks again on request', async () => {
    const error = new ApiError(500, { code: 'INTERNAL', message: 'It broke.', requestId: 'r-77' });
    const wrapper = faces({ error });
    expect(wrapper.text()).toContain('It broke.');
    expect(wrapper.text()).toContain('Reference for support: r-77');
    await wrapper.find('button').trigger('click');
    expect(wrapper.emitted('retry')).toHaveLength(1);
  });

  it('says that there is nothing yet', () => {
    const wrapper = faces({ isEmpty: true, emptyTitle: 'No batches yet' });
    expect(wrapper.text()).toContain('No batches yet');
    expect(wrapper.text()).not.toContain('the list');
  });

  it('shows the content', () => expect(faces({}).text()).toBe('the list'));
});

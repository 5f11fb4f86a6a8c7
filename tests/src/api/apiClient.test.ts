import { describe, expect, it, vi } from 'vitest';
import { apiClient, handleSessionLost } from '@/api/apiClient';
import { jsonAnswer } from '../../support/client/jsonAnswer';

const refusal = (code: string, details?: { path: string; message: string }[]) => ({
  error: { code, message: 'Not so.', requestId: 'r-1', ...(details ? { details } : {}) },
});

/** A server whose sessions have expired until they are renewed. */
function expiredServer(renewalStatus: number) {
  let isRenewed = false;
  return vi.mocked(fetch).mockImplementation(async (url) => {
    if (String(url).endsWith('/session/renewal')) {
      isRenewed = renewalStatus === 200;
      return jsonAnswer({}, renewalStatus);
    }
    return isRenewed ? jsonAnswer({ url: String(url) }) : jsonAnswer(refusal('NOT_SIGNED_IN'), 401);
  });
}

describe('apiClient', () => {
  it('renews an expired session once for requests at the same time and repeats each', async () => {
    const server = expiredServer(200);
    const answers = await Promise.all(['/a', '/b', '/c'].map((path) => apiClient.get(path)));
    expect(answers).toEqual([{ url: '/api/v1/a' }, { url: '/api/v1/b' }, { url: '/api/v1/c' }]);
    const asked = server.mock.calls.map(([url]) => String(url));
    expect(asked.filter((url) => url.endsWith('/session/renewal'))).toHaveLength(1);
    expect(asked).toHaveLength(7);
  });

  it('tells that the session is lost when it cannot be renewed', async () => {
    const onLost = vi.fn();
    handleSessionLost(onLost);
    expiredServer(401);
    await expect(apiClient.get('/a')).rejects.toMatchObject({ status: 401, code: 'NOT_SIGNED_IN' });
    expect(onLost).toHaveBeenCalledOnce();
  });

  it('gives the code, the details and the request id of a refusal', async () => {
    const details = [{ path: 'name', message: 'Too long.' }];
    vi.mocked(fetch).mockResolvedValue(jsonAnswer(refusal('INVALID_INPUT', details), 400));
    await expect(apiClient.post('/projects', {})).rejects.toMatchObject({
      name: 'ApiError',
      status: 400,
      code: 'INVALID_INPUT',
      details,
      requestId: 'r-1',
    });
  });

  it('gives a general error for a page that is not JSON', async () => {
    vi.mocked(fetch).mockResolvedValue(new Response('<html>Bad gateway</html>', { status: 502 }));
    await expect(apiClient.get('/a')).rejects.toMatchObject({
      name: 'ApiError',
      status: 502,
      code: 'UNEXPECTED_ANSWER',
    });
  });

  it('says that the server cannot be reached', async () => {
    await expect(apiClient.get('/a')).rejects.toMatchObject({ status: 0, code: 'UNREACHABLE' });
  });
});

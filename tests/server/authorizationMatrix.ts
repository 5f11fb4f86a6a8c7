import { randomUUID } from 'node:crypto';
import type { HttpMethod } from '../../server/routes/Route.js';

/** Who asks. `stranger` is a member of nothing, `foreign` has every role in another project, `admin` is no member of any. */
export const askers = ['nobody', 'stranger', 'foreign', 'analyst', 'reviewer', 'qaManager', 'admin'] as const;
export type Asker = (typeof askers)[number];

/** What a row's path and body may need; made anew for each row. */
export interface MatrixFixture {
  projectId: string;
  batchId: string;
  /** Its file is in the store. */
  screenedCaptureId: string;
  failedCaptureId: string;
  analystId: string;
  /** An active user with a password who is a member of nothing. */
  otherUserId: string;
  /** A user who has not accepted the invitation. */
  invitedUserId: string;
  failedMailId: string;
}

export interface MatrixRow {
  method: HttpMethod;
  /** As in the route table. */
  path: string;
  url: (fixture: MatrixFixture) => string;
  body?: object;
  /** Multipart upload instead of a JSON body: file name -> content. */
  files?: Record<string, string>;
  /** Status for each asker. 404 to members of other projects: they must not learn that the thing exists. */
  expected: Record<Asker, number>;
}

const everybody = (status: number): Record<Asker, number> => ({
  nobody: status,
  stranger: status,
  foreign: status,
  analyst: status,
  reviewer: status,
  qaManager: status,
  admin: status,
});
const signedIn = (status: number): Record<Asker, number> => ({ ...everybody(status), nobody: 401 });
const adminOnly = (status: number): Record<Asker, number> => ({ ...everybody(403), nobody: 401, admin: status });
const membersAndAdmin = (status: number): Record<Asker, number> => ({
  ...everybody(status),
  nobody: 401,
  stranger: 404,
  foreign: 404,
});
const membersWith = (role: 'analyst' | 'reviewer', status: number): Record<Asker, number> => ({
  ...membersAndAdmin(403),
  [role]: status,
});
const projectAdmin = (status: number): Record<Asker, number> => ({ ...membersAndAdmin(403), admin: status });

const newPassword = 'quiet-harbour-lantern-7';

export const authorizationMatrix: MatrixRow[] = [
  { method: 'get', path: '/health', url: () => '/api/health', expected: everybody(200) },
  { method: 'get', path: '/openapi.json', url: () => '/openapi.json', expected: everybody(200) },
  { method: 'get', path: '/settings', url: () => '/settings', expected: everybody(200) },
  {
    method: 'post',
    path: '/session',
    url: () => '/session',
    body: { email: 'nobody@marram.example', password: newPassword },
    expected: everybody(401),
  },
  { method: 'get', path: '/session', url: () => '/session', expected: signedIn(200) },
  { method: 'delete', path: '/session', url: () => '/session', expected: signedIn(204) },
  { method: 'post', path: '/session/renewal', url: () => '/session/renewal', expected: everybody(401) },
  {
    method: 'post',
    path: '/passwords/reset-request',
    url: () => '/passwords/reset-request',
    // One address may be asked for only a few times.
    get body() {
      return { email: `${randomUUID()}@marram.example` };
    },
    expected: everybody(202),
  },
  {
    method: 'post',
    path: '/passwords',
    url: () => '/passwords',
    body: { token: 'x'.repeat(43), password: newPassword },
    expected: everybody(410),
  },
  {
    method: 'put',
    path: '/me/password',
    url: () => '/me/password',
    body: { currentPassword: 'not-the-current-one', newPassword },
    expected: signedIn(422),
  },
  { method: 'get', path: '/users', url: () => '/users', expected: adminOnly(200) },
  { method: 'get', path: '/users/directory', url: () => '/users/directory', expected: adminOnly(200) },
  {
    method: 'post',
    path: '/users',
    url: () => '/users',
    body: { email: 'new@marram.example', name: 'New' },
    expected: adminOnly(201),
  },
  {
    method: 'patch',
    path: '/users/:userId',
    url: ({ otherUserId }) => `/users/${otherUserId}`,
    body: { name: 'Renamed' },
    expected: adminOnly(200),
  },
  {
    method: 'post',
    path: '/users/:userId/invitation',
    url: ({ invitedUserId }) => `/users/${invitedUserId}/invitation`,
    expected: adminOnly(202),
  },
  { method: 'get', path: '/projects', url: () => '/projects', expected: signedIn(200) },
  { method: 'post', path: '/projects', url: () => '/projects', body: { name: 'New' }, expected: adminOnly(201) },
  {
    method: 'get',
    path: '/projects/:projectId',
    url: ({ projectId }) => `/projects/${projectId}`,
    expected: membersAndAdmin(200),
  },
  {
    method: 'patch',
    path: '/projects/:projectId',
    url: ({ projectId }) => `/projects/${projectId}`,
    body: { description: 'Changed' },
    expected: projectAdmin(200),
  },
  {
    method: 'get',
    path: '/projects/:projectId/members',
    url: ({ projectId }) => `/projects/${projectId}/members`,
    expected: membersAndAdmin(200),
  },
  {
    method: 'put',
    path: '/projects/:projectId/members/:userId',
    url: ({ projectId, otherUserId }) => `/projects/${projectId}/members/${otherUserId}`,
    body: { roles: ['reviewer'] },
    expected: projectAdmin(200),
  },
  {
    method: 'delete',
    path: '/projects/:projectId/members/:userId',
    url: ({ projectId, analystId }) => `/projects/${projectId}/members/${analystId}`,
    expected: projectAdmin(204),
  },
  {
    method: 'get',
    path: '/projects/:projectId/thresholds',
    url: ({ projectId }) => `/projects/${projectId}/thresholds`,
    expected: membersAndAdmin(200),
  },
  {
    method: 'put',
    path: '/projects/:projectId/thresholds',
    url: ({ projectId }) => `/projects/${projectId}/thresholds`,
    body: { guardStart: 0.85 },
    expected: projectAdmin(200),
  },
  { method: 'get', path: '/start', url: () => '/start', expected: signedIn(200) },
  { method: 'get', path: '/review', url: () => '/review', expected: signedIn(200) },
  { method: 'get', path: '/batches', url: () => '/batches', expected: signedIn(200) },
  {
    method: 'get',
    path: '/projects/:projectId/batches',
    url: ({ projectId }) => `/projects/${projectId}/batches`,
    expected: membersAndAdmin(200),
  },
  {
    method: 'post',
    path: '/projects/:projectId/batches',
    url: ({ projectId }) => `/projects/${projectId}/batches`,
    body: { name: 'New' },
    expected: membersWith('analyst', 201),
  },
  {
    method: 'get',
    path: '/batches/:batchId',
    url: ({ batchId }) => `/batches/${batchId}`,
    expected: membersAndAdmin(200),
  },
  {
    method: 'patch',
    path: '/batches/:batchId',
    url: ({ batchId }) => `/batches/${batchId}`,
    body: { name: 'Renamed' },
    expected: membersWith('analyst', 200),
  },
  {
    method: 'post',
    path: '/batches/:batchId/captures',
    url: ({ batchId }) => `/batches/${batchId}/captures`,
    files: { 'hall.csv': 'time;value\n0,000;1,0\n0,001;2,0\n0,002;1,5\n' },
    expected: membersWith('analyst', 201),
  },
  {
    method: 'post',
    path: '/batches/:batchId/complete',
    url: ({ batchId }) => `/batches/${batchId}/complete`,
    expected: membersWith('analyst', 200),
  },
  {
    method: 'get',
    path: '/batches/:batchId/captures',
    url: ({ batchId }) => `/batches/${batchId}/captures`,
    expected: membersAndAdmin(200),
  },
  {
    method: 'get',
    path: '/captures/:captureId',
    url: ({ screenedCaptureId }) => `/captures/${screenedCaptureId}`,
    expected: membersAndAdmin(200),
  },
  {
    method: 'get',
    path: '/captures/:captureId/spectrum',
    url: ({ failedCaptureId }) => `/captures/${failedCaptureId}/spectrum`,
    expected: membersAndAdmin(409),
  },
  {
    method: 'get',
    path: '/captures/:captureId/file',
    url: ({ screenedCaptureId }) => `/captures/${screenedCaptureId}/file`,
    expected: membersAndAdmin(200),
  },
  {
    method: 'put',
    path: '/captures/:captureId/acquisition',
    url: ({ failedCaptureId }) => `/captures/${failedCaptureId}/acquisition`,
    body: { acquisition: {} },
    expected: membersWith('analyst', 200),
  },
  {
    method: 'post',
    path: '/captures/:captureId/retry',
    url: ({ failedCaptureId }) => `/captures/${failedCaptureId}/retry`,
    expected: membersWith('analyst', 200),
  },
  {
    method: 'put',
    path: '/captures/:captureId/decision',
    url: ({ screenedCaptureId }) => `/captures/${screenedCaptureId}/decision`,
    body: { decision: 'accept', reason: 'Band edge is protected' },
    expected: membersWith('reviewer', 200),
  },
  { method: 'get', path: '/mail', url: () => '/mail', expected: adminOnly(200) },
  {
    method: 'post',
    path: '/mail/:mailId/resend',
    url: ({ failedMailId }) => `/mail/${failedMailId}/resend`,
    expected: adminOnly(202),
  },
  { method: 'get', path: '/demo/mail', url: () => '/demo/mail', expected: signedIn(404) },
  { method: 'get', path: '/demo/mail/:mailId', url: () => '/demo/mail/a', expected: signedIn(404) },
];

import type { ChangePassword, CurrentSession, SessionResponse, SetPassword, SignIn } from '@shared/schemas/account.js';
import { apiClient } from './apiClient';

export const sessionApi = {
  signIn: (body: SignIn) => apiClient.post<SessionResponse>('/session', body),
  current: () => apiClient.get<CurrentSession>('/session'),
  signOut: () => apiClient.delete('/session'),
  requestReset: (email: string) => apiClient.post<unknown>('/passwords/reset-request', { email }),
  setPassword: (body: SetPassword) => apiClient.post<unknown>('/passwords', body),
  changePassword: (body: ChangePassword) => apiClient.put<unknown>('/me/password', body),
};

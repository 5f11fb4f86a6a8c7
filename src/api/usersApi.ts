import type { InviteUser, UpdateUser, UserDto } from '@shared/schemas/account.js';
import { apiClient } from './apiClient';

export const usersApi = {
  list: () => apiClient.get<{ items: UserDto[] }>('/users'),
  invite: (body: InviteUser) => apiClient.post<UserDto>('/users', body),
  update: (userId: string, body: UpdateUser) => apiClient.patch<UserDto>(`/users/${userId}`, body),
  inviteAgain: (userId: string) => apiClient.post<unknown>(`/users/${userId}/invitation`),
};

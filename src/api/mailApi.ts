import type { MailMessageDto } from '@shared/schemas/system.js';
import { apiClient } from './apiClient';

export const mailApi = {
  list: (state?: string) => apiClient.get<{ items: MailMessageDto[] }>('/mail', { state }),
  resend: (mailId: string) => apiClient.post<unknown>(`/mail/${mailId}/resend`),
};

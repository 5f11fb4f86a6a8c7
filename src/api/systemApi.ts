import type { DemoMail, DemoMailDetail, PublicSettings, StartPage } from '@shared/schemas/system.js';
import { apiClient } from './apiClient';

export const systemApi = {
  settings: () => apiClient.get<PublicSettings>('/settings'),
  start: () => apiClient.get<StartPage>('/start'),
  demoMail: () => apiClient.get<{ items: DemoMail[] }>('/demo/mail'),
  demoMailDetail: (id: string) => apiClient.get<DemoMailDetail>(`/demo/mail/${encodeURIComponent(id)}`),
};

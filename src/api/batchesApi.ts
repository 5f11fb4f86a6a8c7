import type { BatchDto, CreateBatch } from '@shared/schemas/batch.js';
import type { Page } from '@shared/schemas/common.js';
import { apiClient } from './apiClient';

export interface BatchListOptions {
  state?: string;
  cursor?: string;
  limit?: number;
}

export const batchesApi = {
  list: (options: BatchListOptions = {}) => apiClient.get<Page<BatchDto>>('/batches', { ...options }),
  listOfProject: (projectId: string, options: BatchListOptions = {}) =>
    apiClient.get<Page<BatchDto>>(`/projects/${projectId}/batches`, { ...options }),
  get: (batchId: string) => apiClient.get<BatchDto>(`/batches/${batchId}`),
  create: (projectId: string, body: CreateBatch) => apiClient.post<BatchDto>(`/projects/${projectId}/batches`, body),
  rename: (batchId: string, name: string) => apiClient.patch<BatchDto>(`/batches/${batchId}`, { name }),
  complete: (batchId: string) => apiClient.post<BatchDto>(`/batches/${batchId}/complete`),
};

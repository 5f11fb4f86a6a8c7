import type { CaptureDto, CaptureListQuery, CaptureRow, PutAcquisition, SpectrumDto } from '@shared/schemas/capture.js';
import type { Page } from '@shared/schemas/common.js';
import type { PutDecision } from '@shared/schemas/decision.js';
import { apiClient, apiRoot } from './apiClient';

export interface SpectrumOptions {
  channel?: number;
  kind?: 'survey' | 'fine';
  fromHz?: number;
  toHz?: number;
  points?: number;
}

/** What the review table can be narrowed by; empty values are left out. */
export interface ReviewFilters {
  projectId?: string;
  batchId?: string;
  verdict?: string;
  findingKind?: string;
  decided?: string;
  clearToBelowHz?: string;
  search?: string;
  sort?: string;
  cursor?: string;
  limit?: number;
}

export const capturesApi = {
  ofBatch: (batchId: string, query: CaptureListQuery = {}) =>
    apiClient.get<Page<CaptureRow>>(`/batches/${batchId}/captures`, { ...query } as Record<string, string>),
  review: (query: ReviewFilters = {}) => apiClient.get<Page<CaptureRow>>('/review', { ...query }),
  get: (captureId: string) => apiClient.get<CaptureDto>(`/captures/${captureId}`),
  spectrum: (captureId: string, options: SpectrumOptions = {}, signal?: AbortSignal) =>
    apiClient.get<SpectrumDto>(`/captures/${captureId}/spectrum`, { ...options }, signal),
  decide: (captureId: string, body: PutDecision) => apiClient.put<CaptureDto>(`/captures/${captureId}/decision`, body),
  putAcquisition: (captureId: string, body: PutAcquisition) =>
    apiClient.put<CaptureDto>(`/captures/${captureId}/acquisition`, body),
  retry: (captureId: string) => apiClient.post<CaptureDto>(`/captures/${captureId}/retry`),
  fileUrl: (captureId: string) => `${apiRoot}/captures/${captureId}/file`,
};

import type { CreateProject, MemberDto, ProjectDto, PutMember, UpdateProject } from '@shared/schemas/project.js';
import type { PutThresholds, ThresholdsResponse } from '@shared/schemas/thresholds.js';
import { apiClient } from './apiClient';

export interface DirectoryEntry {
  id: string;
  name: string;
  email: string;
}

export const projectsApi = {
  list: () => apiClient.get<{ items: ProjectDto[] }>('/projects'),
  get: (projectId: string) => apiClient.get<ProjectDto>(`/projects/${projectId}`),
  create: (body: CreateProject) => apiClient.post<ProjectDto>('/projects', body),
  update: (projectId: string, body: UpdateProject) => apiClient.patch<ProjectDto>(`/projects/${projectId}`, body),
  members: (projectId: string) => apiClient.get<{ items: MemberDto[] }>(`/projects/${projectId}/members`),
  putMember: (projectId: string, userId: string, body: PutMember) =>
    apiClient.put<MemberDto>(`/projects/${projectId}/members/${userId}`, body),
  removeMember: (projectId: string, userId: string) => apiClient.delete(`/projects/${projectId}/members/${userId}`),
  directory: (search: string) => apiClient.get<{ items: DirectoryEntry[] }>('/users/directory', { search }),
  thresholds: (projectId: string) => apiClient.get<ThresholdsResponse>(`/projects/${projectId}/thresholds`),
  putThresholds: (projectId: string, body: PutThresholds) =>
    apiClient.put<ThresholdsResponse>(`/projects/${projectId}/thresholds`, body),
};

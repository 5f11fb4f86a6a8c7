import type { ProjectRole } from '@shared/schemas/account.js';

const labels: Record<ProjectRole, string> = { analyst: 'analyst', reviewer: 'reviewer', qaManager: 'QA manager' };

export const roleLabel = (role: ProjectRole): string => labels[role];

import { uploadLimits } from '../../shared/constants/limits.js';
import type { PublicSettings } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import { demoAccounts } from '../demo/demoAccounts.js';

/** What everybody may know before signing in. Sign-ins are shown in a demo only. */
export function presentSettings({ config, version }: Pick<AppDependencies, 'config' | 'version'>): PublicSettings {
  const accounts = config.OVERFOLD_DEMO ? demoAccounts : [];
  return {
    isDemo: config.OVERFOLD_DEMO,
    demoAccounts: accounts.map(({ role, name, email, password }) => ({ role, name, email, password })),
    version,
    limits: {
      maxFileBytes: config.MAX_FILE_BYTES,
      maxFilesPerBatch: config.MAX_FILES_PER_BATCH,
      maxFilesPerRequest: uploadLimits.maxFilesPerRequest,
      maxChannels: uploadLimits.maxChannels,
    },
  };
}

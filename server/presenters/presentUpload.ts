import type { UploadResponse } from '../../shared/schemas/capture.js';
import type { UploadOutcome } from '../services/UploadService.js';

export function presentUpload({ captures, refused }: UploadOutcome): UploadResponse {
  return {
    captures: captures.map(({ id, fileName, state, sha256, sizeBytes, format, duplicateOfId }) => ({
      id,
      fileName,
      state,
      sha256,
      sizeBytes,
      format,
      duplicateOfId,
    })),
    refused,
  };
}

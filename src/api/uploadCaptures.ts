import type { AcquisitionSheet } from '@shared/schemas/acquisitionSheet.js';
import type { UploadResponse } from '@shared/schemas/capture.js';
import type { CsvLayout } from '@shared/schemas/csvLayout.js';
import { ApiError } from './ApiError';
import { buildUrl, clientHeader, renewSession, toApiError } from './apiClient';

export interface UploadPart {
  path: string;
  file: File;
  acquisition?: AcquisitionSheet;
  csvLayout?: CsvLayout;
}

interface UploadOptions {
  onProgress: (sentBytes: number) => void;
  signal: AbortSignal;
  replaces?: string;
}

function toForm(parts: UploadPart[], replaces: string | undefined): FormData {
  const form = new FormData();
  const sheets = parts.flatMap((part) => (part.acquisition ? [[part.path, part.acquisition] as const] : []));
  const layouts = parts.flatMap((part) => (part.csvLayout ? [[part.path, part.csvLayout] as const] : []));
  // Text fields go first: the server has read them when the files arrive.
  if (sheets.length > 0) form.append('acquisition', JSON.stringify(Object.fromEntries(sheets)));
  if (layouts.length > 0) form.append('csvLayout', JSON.stringify(Object.fromEntries(layouts)));
  if (replaces) form.append('replaces', replaces);
  for (const { path, file } of parts) form.append('files', file, path);
  return form;
}

/** fetch tells nothing of how much has been sent; XMLHttpRequest does. */
function post(
  url: string,
  form: FormData,
  { onProgress, signal }: UploadOptions,
): Promise<{ status: number; text: string }> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open('POST', url);
    for (const [name, value] of Object.entries(clientHeader)) request.setRequestHeader(name, value);
    request.upload.onprogress = (event) => onProgress(event.loaded);
    request.onload = () => resolve({ status: request.status, text: request.responseText });
    request.onerror = () =>
      reject(new ApiError(0, { code: 'UNREACHABLE', message: 'The connection broke off.', requestId: '' }));
    request.onabort = () => reject(new DOMException('The upload was stopped.', 'AbortError'));
    signal.addEventListener('abort', () => request.abort(), { once: true });
    request.send(form);
  });
}

/** Sends some files of a batch in one request; the answer names those taken and those refused. */
export async function uploadCaptures(
  batchId: string,
  parts: UploadPart[],
  options: UploadOptions,
): Promise<UploadResponse> {
  const url = buildUrl(`/batches/${batchId}/captures`);
  let answer = await post(url, toForm(parts, options.replaces), options);
  if (answer.status === 401 && (await renewSession()))
    answer = await post(url, toForm(parts, options.replaces), options);
  if (answer.status !== 201) throw toApiError(answer.status, answer.text);
  return JSON.parse(answer.text) as UploadResponse;
}

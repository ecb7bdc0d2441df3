import * as contract from '@shared/contract/uploads';
import { type UploadCheck } from '@shared/contract/uploads';
import { ApiError } from './api-error';
import { call, pathOf } from './call';
import { ownHeader } from './client';

/** Enough to see what a file is; the server looks at no more. */
const prefixBytes = 256 * 1024;
/** Above this the whole file is not hashed in the page just to recognise it: the server does so anyway. */
const mostHashedBytes = 64 * 1024 * 1024;

async function sha256Hex(file: File): Promise<string | undefined> {
  if (file.size > mostHashedBytes || !('subtle' in crypto)) return undefined;
  const digest = await crypto.subtle.digest('SHA-256', await file.arrayBuffer());
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** Sends the first part of a file and learns how it would be read. Writes nothing. */
export async function checkUpload(
  lotId: string,
  file: File,
  mapping?: contract.Mapping,
): Promise<UploadCheck> {
  const form = new FormData();
  if (mapping) form.set('mapping', JSON.stringify(mapping));
  const sha256 = await sha256Hex(file);
  if (sha256) form.set('sha256', sha256);
  form.set('fileName', file.name);
  form.set('file', file.slice(0, prefixBytes), file.name);
  return call(contract.checkUpload, { params: { id: lotId }, form });
}

export interface UploadFields {
  benchId?: string;
  mapping?: contract.Mapping;
  rememberMapping?: boolean;
  acceptWarnings?: boolean;
}

/** XMLHttpRequest, because fetch cannot say how much of a body has gone out. Resolves with the upload's id. */
export function sendFile(
  lotId: string,
  file: File,
  fields: UploadFields,
  onSent: (bytes: number) => void,
  signal: AbortSignal,
): Promise<{ id: string }> {
  const form = new FormData();
  if (fields.benchId) form.set('benchId', fields.benchId);
  if (fields.mapping) form.set('mapping', JSON.stringify(fields.mapping));
  form.set('rememberMapping', String(fields.rememberMapping ?? false));
  form.set('acceptWarnings', String(fields.acceptWarnings ?? false));
  form.set('file', file, file.name);
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open('POST', pathOf(contract.uploadFile, { id: lotId }));
    for (const [name, value] of Object.entries(ownHeader)) request.setRequestHeader(name, value);
    request.responseType = 'json';
    request.upload.onprogress = ({ loaded }) => onSent(Math.min(loaded, file.size));
    request.onload = () => {
      if (request.status === 202) return resolve(request.response as { id: string });
      const error = (
        request.response as {
          error?: { code: string; message: string; fields?: Record<string, string> };
        } | null
      )?.error;
      reject(
        new ApiError(
          request.status,
          error?.code ?? 'unknown',
          error?.message ?? 'The file was not taken. See the list of uploads before you try again.',
          error?.fields,
        ),
      );
    };
    // The server may answer while we still send, and the answer is then lost with the connection.
    request.onerror = () =>
      reject(
        new ApiError(
          0,
          'offline',
          'The connection broke off while the file was being sent. See the list of uploads before you try again.',
        ),
      );
    request.onabort = () => reject(new DOMException('Stopped', 'AbortError'));
    signal.addEventListener('abort', () => request.abort(), { once: true });
    request.send(form);
  });
}

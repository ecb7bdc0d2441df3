import * as contract from '@shared/contract/analysis';
import { ApiError } from './api-error';
import { addressOf, call, pathOf } from './call';

export type { Analysis } from '@shared/contract/analysis';

export const readAnalysis = (lotId: string, analysisId: string | undefined, signal?: AbortSignal) =>
  call(contract.readAnalysis, { params: { id: lotId }, query: { analysisId }, signal });

export const listAnalyses = (lotId: string, signal?: AbortSignal) =>
  call(contract.listAnalyses, { params: { id: lotId }, signal });

export const analysisExportAddress = (id: string) =>
  addressOf(contract.exportAnalysis, { params: { id } });

/** Sorted offsets in ppm. The only answer that is not text, so it has a way of its own. */
export async function readOffsets(id: string, signal?: AbortSignal): Promise<Float64Array> {
  let response: Response;
  try {
    response = await fetch(pathOf(contract.readOffsets, { id }), {
      credentials: 'same-origin',
      signal,
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new ApiError(0, 'offline', 'The readings could not be fetched. Try again in a moment.');
  }
  if (!response.ok)
    throw new ApiError(
      response.status,
      `http_${response.status}`,
      'The readings of this analysis could not be fetched. Load the page again.',
    );
  return float64sOf(await response.arrayBuffer());
}

/** The wire is little endian; a machine that is not reads value by value. */
export function float64sOf(bytes: ArrayBuffer): Float64Array {
  if (bytes.byteLength % 8 !== 0)
    throw new ApiError(200, 'unreadable', 'The readings arrived incomplete. Load the page again.');
  if (new Uint8Array(Uint16Array.of(1).buffer)[0] === 1) return new Float64Array(bytes);
  const view = new DataView(bytes);
  return Float64Array.from({ length: bytes.byteLength / 8 }, (_, i) =>
    view.getFloat64(8 * i, true),
  );
}

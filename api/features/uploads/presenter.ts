import type { Upload as UploadAnswer, UploadItem } from '../../contract/uploads.ts';
import type { Upload } from '../../models/Upload.ts';
import type { StoredPart } from '../../services/storage.ts';
import { partCount } from './upload-parts.ts';

/** An upload as a list shows it. */
export function presentUploadItem(upload: Upload): UploadItem {
  return {
    id: upload.id,
    commissionId: upload.commissionId,
    purpose: upload.purpose,
    state: upload.state,
    name: upload.name,
    originalName: upload.originalName,
    size: upload.sizeBytes,
    sha256: upload.sha256,
    partSize: upload.partSize,
    partCount: partCount(upload),
    problem: upload.problem,
    frameId: upload.frameId,
    createdAt: upload.createdAt.toISOString(),
  };
}

/** An upload with the parts that are there. */
export function presentUpload(upload: Upload, parts: StoredPart[]): UploadAnswer {
  return { ...presentUploadItem(upload), partsThere: parts.map((part) => part.number) };
}

import { ApiError } from '@/lib/api';
import type { ProblemDocument } from '@/lib/problem';
import type { JobView } from '@/features/jobs';
import type { ImportOptions, ImportView } from '../imports';

export interface Sent {
  readonly job: JobView;
  readonly import: ImportView;
  readonly repeated: boolean;
}

export interface Sending {
  /** 0…1 of all bytes. */
  readonly share: number;
  readonly words: string;
}

/** Uploads with true progress, which fetch cannot report. `stop` breaks it off. */
export function sendFiles(
  communityId: string,
  files: { ties: File; members: File | undefined; mapping: File | undefined },
  options: Partial<ImportOptions>,
  onProgress: (sending: Sending) => void,
): { done: Promise<Sent>; stop: () => void } {
  const form = new FormData();
  form.set('options', JSON.stringify(options));
  for (const [role, file] of Object.entries(files)) if (file) form.set(role, file);
  const request = new XMLHttpRequest();
  const done = new Promise<Sent>((resolve, reject) => {
    request.upload.onprogress = (event) =>
      event.lengthComputable && onProgress({ share: event.loaded / event.total, words: 'Sending files' });
    request.onload = () => {
      const body = JSON.parse(request.responseText || 'null') as Sent | ProblemDocument;
      if (request.status === 202) resolve(body as Sent);
      else reject(new ApiError(body as ProblemDocument));
    };
    const lost = (detail: string) => () =>
      reject(new ApiError({ type: 'about:blank', title: 'The upload ended.', status: 0, detail }));
    request.onerror = lost('The server could not be reached. Nothing was kept; send it again.');
    request.onabort = lost('You stopped it. Nothing was kept.');
    request.open('POST', `/api/v1/communities/${communityId}/imports`);
    request.send(form);
  });
  return { done, stop: () => request.abort() };
}

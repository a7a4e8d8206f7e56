import { ApiError } from '@/lib/api';
import type { ProblemDocument } from '@/lib/problem';
import type { JobView } from '@/features/jobs';
import type { ImportView } from '../imports';

export interface Sent {
  readonly job: JobView;
  readonly import: ImportView;
  readonly repeated: boolean;
}

/** Uploads with true progress, which fetch cannot report. The returned function breaks it off. */
export function sendFiles(
  url: string,
  form: FormData,
  onProgress: (share: number) => void,
): { done: Promise<Sent>; stop: () => void } {
  const request = new XMLHttpRequest();
  const done = new Promise<Sent>((resolve, reject) => {
    request.upload.onprogress = (event) => event.lengthComputable && onProgress(event.loaded / event.total);
    request.onload = () => {
      const body = JSON.parse(request.responseText || 'null') as Sent | ProblemDocument;
      if (request.status === 202) resolve(body as Sent);
      else reject(new ApiError(body as ProblemDocument));
    };
    const lost = (detail: string) => () =>
      reject(new ApiError({ type: 'about:blank', title: 'The upload ended.', status: 0, detail }));
    request.onerror = lost('The server could not be reached. Nothing was kept; send it again.');
    request.onabort = lost('You stopped it. Nothing was kept.');
    request.open('POST', url);
    request.send(form);
  });
  return { done, stop: () => request.abort() };
}

/**
 * Sends a form as fetch would, and tells how much of it has gone out: fetch itself cannot. Rejects where there is no
 * connection, as fetch does.
 */
export const sendForm = (input: string, init: RequestInit, onSent: (share: number) => void): Promise<Response> =>
  new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open(init.method ?? 'POST', input);
    for (const [name, value] of Object.entries((init.headers ?? {}) as Record<string, string>))
      request.setRequestHeader(name, value);
    request.upload.addEventListener('progress', ({ loaded, total, lengthComputable }) => {
      if (lengthComputable && total > 0) onSent(loaded / total);
    });
    const failed = () => reject(new TypeError('The upload broke off.'));
    for (const event of ['error', 'abort', 'timeout'] as const) request.addEventListener(event, failed);
    request.addEventListener('load', () => {
      const headers = new Headers();
      for (const name of ['content-type', 'date', 'retry-after']) {
        const value = request.getResponseHeader(name);
        if (value !== null) headers.set(name, value);
      }
      resolve(new Response(request.responseText, { status: request.status, headers }));
    });
    init.signal?.addEventListener('abort', () => request.abort());
    request.send(init.body as FormData | Blob);
  });

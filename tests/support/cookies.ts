import type { Response } from 'supertest';

/** The Set-Cookie headers of an answer, by the cookie's name. */
export function cookiesOf(answer: Response): Record<string, { value: string; attributes: string[] }> {
  const headers = (answer.headers['set-cookie'] ?? []) as unknown as string[];
  return Object.fromEntries(
    headers.map((header) => {
      const [pair = '', ...attributes] = header.split(';').map((part) => part.trim());
      const at = pair.indexOf('=');
      return [pair.slice(0, at), { value: decodeURIComponent(pair.slice(at + 1)), attributes }];
    }),
  );
}

/** A browser's cookie jar, as far as the tests need one: keeps what it is told, forgets what is cleared. */
export class Jar {
  private readonly cookies = new Map<string, string>();

  take(answer: Response): Response {
    for (const [name, { value, attributes }] of Object.entries(cookiesOf(answer))) {
      const cleared = attributes.some((attribute) => /^Expires=Thu, 01 Jan 1970/.test(attribute));
      if (cleared) this.cookies.delete(name);
      else this.cookies.set(name, value);
    }
    return answer;
  }

  get(name: string): string | undefined {
    return this.cookies.get(name);
  }

  set(name: string, value: string): void {
    this.cookies.set(name, value);
  }

  forget(name: string): void {
    this.cookies.delete(name);
  }

  header(): string {
    return [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  }
}

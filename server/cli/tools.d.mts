// Types of the part of tools.mjs that TypeScript code uses.
export function fromRoot(...parts: string[]): string;
export function chromiumPath(): string | null;

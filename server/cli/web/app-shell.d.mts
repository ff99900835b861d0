// Types of the part of app-shell.mjs that the tests use.
export function shellOf(folder: string): { build: string; scripts: string[]; files: string[] };
export function writeServiceWorker(folder: string): void;

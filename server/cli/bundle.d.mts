export function bundleServer(outdir: string, beside?: Record<string, string>): Promise<void>;

export function findChromium(): string | undefined;
export function installScript(names: string[]): string;

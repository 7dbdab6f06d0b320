export function isPortFree(port: number, host?: string): Promise<boolean>;
export function freePort(): Promise<number>;
export function portFrom(name: string, standard: number, env?: Record<string, string | undefined>): number;
export function requirePort(variable: string, port: number, purpose: string, host?: string): Promise<void>;

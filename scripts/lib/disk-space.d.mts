export function freeMegabytes(folder: string): number;
export function requireFreeSpace(folder: string, options?: { needed?: number; free?: number }): void;

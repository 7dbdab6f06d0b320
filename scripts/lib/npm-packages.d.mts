export interface LockedPackage {
  version?: string;
  optional?: boolean;
  peer?: boolean;
}
type Packages = Record<string, LockedPackage>;
export function requireNode(version?: string): void;
export function areInstalled(wanted: Packages | undefined, installed: Packages | undefined): boolean;

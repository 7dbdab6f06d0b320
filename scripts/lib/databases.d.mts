import type { Client } from 'pg';

export interface DatabaseUrls {
  superuserUrl: string;
  ownerUrl: string;
  appUrl: string;
}

export function createDatabase(
  urls: DatabaseUrls,
  name: string,
  options?: { template?: string },
): Promise<DatabaseUrls>;
export function dropDatabase(urls: DatabaseUrls, name: string): Promise<void>;
export function databaseExists(urls: DatabaseUrls, name: string): Promise<boolean>;
export function urlsFor(urls: DatabaseUrls, name: string): DatabaseUrls;
export function withDatabase(url: string, name: string): string;
export function withClient<T>(url: string, work: (client: Client) => Promise<T>): Promise<T>;

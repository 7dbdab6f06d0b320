export class Refusal extends Error {
  constructor(sentence: string, wayOut: string, options?: { details?: string[] });
  wayOut: string;
  details: string[];
}

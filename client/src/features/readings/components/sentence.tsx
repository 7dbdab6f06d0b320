import type { SentencePart } from '../sentence.ts';

/** A composed sentence with its exception set strong. */
export function Sentence({ parts }: { parts: readonly SentencePart[] }) {
  return parts.map((part, i) => (part.isStrong ? <b key={i}>{part.text}</b> : part.text));
}

import type { ReactNode } from 'react';
import { useQueue } from '../offline/phone-queue.ts';
import { saveWords } from '../offline/save-words.ts';
import { useBench } from './bench-context.ts';

/** What is saved where, and right under it the one button. */
export function BenchFoot({ children }: { children: ReactNode }) {
  const { view, timeZone, isOnline } = useBench();
  const { lastSentAt, isSignedOut } = useQueue();
  const words = saveWords({
    waiting: view.waiting,
    refused: view.refused.length,
    lastSentAt,
    isSignedOut,
    isOnline,
    timeZone,
  });
  return (
    <div className="bench-foot">
      <p className="bench-save" role="status">
        {words}
      </p>
      {children}
    </div>
  );
}

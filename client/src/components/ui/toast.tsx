import { Toast as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';
import { createContext, useCallback, useContext, useState } from 'react';

interface ToastEntry {
  key: number;
  sentence: string;
}

const ToastContext = createContext<(sentence: string) => void>(() => undefined);

/** Long enough to read two short sentences twice. */
const SHOWN_MS = 6000;

/**
 * Says that something was done. Only for what is also visible elsewhere afterwards: nothing that must be kept, no
 * failure and no secret may live in a toast.
 */
export function ToastProvider({ children }: { children: ReactNode }) {
  const [entries, setEntries] = useState<readonly ToastEntry[]>([]);
  const say = useCallback((sentence: string) => {
    setEntries((before) => [...before.slice(-2), { key: (before.at(-1)?.key ?? 0) + 1, sentence }]);
  }, []);
  const drop = (key: number) => setEntries((before) => before.filter((entry) => entry.key !== key));
  return (
    <ToastContext value={say}>
      <Primitive.Provider duration={SHOWN_MS} label="Done">
        {children}
        {entries.map((entry) => (
          <Primitive.Root
            key={entry.key}
            className="toast"
            onOpenChange={(isOpen) => {
              if (!isOpen) drop(entry.key);
            }}
          >
            <Primitive.Description>{entry.sentence}</Primitive.Description>
            <Primitive.Close className="button button-quiet">Close</Primitive.Close>
          </Primitive.Root>
        ))}
        <Primitive.Viewport className="toasts" label="Done ({hotkey})" />
      </Primitive.Provider>
    </ToastContext>
  );
}

/** `const say = useToast(); say('Probe 4E-2217 is registered.')` */
export function useToast(): (sentence: string) => void {
  return useContext(ToastContext);
}

import { useEffect, useRef, useState } from 'react';

const MUTE_KEY = 'saltmark.bench-muted';

/** Keeps the screen lit while the bench is open, and again after the phone was put away for a moment. */
export function useWakeLock(): void {
  useEffect(() => {
    if (!('wakeLock' in navigator)) return undefined;
    let lock: WakeLockSentinel | null = null;
    let isOver = false;
    const ask = async () => {
      if (document.visibilityState !== 'visible' || isOver) return;
      try {
        lock = await navigator.wakeLock.request('screen');
        if (isOver) await lock.release();
      } catch {
        // Low battery or a policy: the screen then dims as it always does.
      }
    };
    const again = () => void ask();
    document.addEventListener('visibilitychange', again);
    void ask();
    return () => {
      isOver = true;
      document.removeEventListener('visibilitychange', again);
      void lock?.release();
    };
  }, []);
}

/** A sound may only begin after a press: the first press on the page opens the way. */
function useTone() {
  const context = useRef<AudioContext | null>(null);
  useEffect(() => {
    const open = () => {
      context.current ??= new AudioContext();
      void context.current.resume();
    };
    window.addEventListener('pointerdown', open);
    window.addEventListener('keydown', open);
    return () => {
      window.removeEventListener('pointerdown', open);
      window.removeEventListener('keydown', open);
      void context.current?.close();
      context.current = null;
    };
  }, []);
  return () => {
    const audio = context.current;
    if (audio?.state !== 'running') return;
    const tone = audio.createOscillator();
    const level = audio.createGain();
    tone.frequency.value = 880;
    level.gain.setValueAtTime(0.2, audio.currentTime);
    level.gain.exponentialRampToValueAtTime(0.001, audio.currentTime + 0.25);
    tone.connect(level).connect(audio.destination);
    tone.start();
    tone.stop(audio.currentTime + 0.25);
  };
}

/** Tells hand and ear when readings become stable; the tone can be switched off on this device. */
export function useStableSignal(isStable: boolean) {
  const [isMuted, setIsMuted] = useState(() => localStorage.getItem(MUTE_KEY) === '1');
  const sound = useTone();
  const was = useRef(isStable);
  useEffect(() => {
    if (isStable && !was.current) {
      // Some browsers have no vibration, some refuse it before the first press.
      navigator.vibrate?.([120, 60, 120]);
      if (!isMuted) sound();
    }
    was.current = isStable;
  }, [isStable, isMuted, sound]);
  const mute = (isOff: boolean) => {
    localStorage.setItem(MUTE_KEY, isOff ? '1' : '0');
    setIsMuted(isOff);
  };
  return { isMuted, mute };
}

import { useEffect, useRef, useState } from 'react';

interface DetectedCode {
  rawValue: string;
}
interface CodeDetector {
  detect: (source: HTMLVideoElement) => Promise<DetectedCode[]>;
}
type CodeDetectorClass = new (options: { formats: string[] }) => CodeDetector;

const FORMATS = ['qr_code', 'data_matrix', 'code_128', 'code_39'];
const LOOK_EVERY_MS = 200;

/** The browser's own code reader; where it has none, codes are typed. */
function codeReader(): CodeDetectorClass | null {
  const found = (window as { BarcodeDetector?: CodeDetectorClass }).BarcodeDetector;
  return found && navigator.mediaDevices ? found : null;
}

export const canScan = (): boolean => codeReader() !== null;

/** Reads codes from the rear camera, shown in the video element that takes the ref, until one is found. */
export function useScanner(onCode: (code: string) => void) {
  const video = useRef<HTMLVideoElement>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const told = useRef(onCode);
  useEffect(() => {
    told.current = onCode;
  }, [onCode]);
  useEffect(() => {
    const Reader = codeReader();
    if (!Reader) return undefined;
    let isOver = false;
    let stream: MediaStream | null = null;
    let timer: ReturnType<typeof setTimeout> | null = null;
    const reader = new Reader({ formats: FORMATS });
    const look = async () => {
      const picture = video.current;
      const codes = picture && picture.readyState >= 2 ? await reader.detect(picture) : [];
      if (isOver) return;
      const code = codes[0]?.rawValue.trim();
      if (code) told.current(code);
      else timer = setTimeout(() => void look(), LOOK_EVERY_MS);
    };
    const begin = async () => {
      stream = await navigator.mediaDevices.getUserMedia({ video: { facingMode: 'environment' } });
      const picture = video.current;
      if (isOver || !picture) return stream.getTracks().forEach((track) => track.stop());
      picture.srcObject = stream;
      await picture.play();
      await look();
    };
    begin().catch(() => setRefusal('The camera cannot be used here. Type the code instead.'));
    return () => {
      isOver = true;
      if (timer !== null) clearTimeout(timer);
      stream?.getTracks().forEach((track) => track.stop());
    };
  }, []);
  return { video, refusal };
}

/** A label may carry an address of ours (`https://…/probes/12`) or the bare code. */
export function codeFromLabel(text: string): { probeId: number | null; code: string } {
  const match = /\/probes\/([1-9]\d{0,9})(?:[/?#]|$)/.exec(text);
  return { probeId: match ? Number(match[1]) : null, code: text.trim() };
}

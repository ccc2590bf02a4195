import { useLayoutEffect, useRef, useState } from 'preact/hooks';

/** Anything smaller is not laid out yet. */
const LEAST = 40;

/** Size of an element in sheet pixels (1/16 rem), watched; null until it has been measured. A drawing made at this size never scales its text. */
export function useSheetSize<Element extends HTMLElement>() {
  const ref = useRef<Element>(null);
  const [size, setSize] = useState<{ width: number; height: number } | null>(null);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return undefined;
    const measure = () => {
      const { width, height } = element.getBoundingClientRect();
      const scale = 16 / rootPixels();
      const next = { width: Math.floor(width * scale), height: Math.floor(height * scale) };
      if (next.width < LEAST || next.height < LEAST) return;
      setSize((before) => (before?.width === next.width && before.height === next.height ? before : next));
    };
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    measure();
    return () => observer.disconnect();
  }, []);
  return { ref, size };
}

/** CSS pixels in one rem. */
export function rootPixels(): number {
  return Number.parseFloat(getComputedStyle(document.documentElement).fontSize);
}

/** Sheet pixels as a CSS length. */
export function rem(pixels: number): string {
  return `${pixels / 16}rem`;
}

import { vi } from 'vitest';

/** What jsdom lacks of a screen: a size, a canvas that takes strokes, an observer of sizes, a frame at once. */
export interface PaintedCanvas {
  strokes: number;
}
export function standInForScreen(widthPx = 900, heightPx = 520): PaintedCanvas {
  const painted: PaintedCanvas = { strokes: 0 };
  const context = new Proxy<Record<string, unknown>>(
    {},
    {
      get: (target, name) => {
        if (name === 'stroke') return () => (painted.strokes += 1);
        return target[name as string] ?? (() => undefined);
      },
      set: (target, name, value) => {
        target[name as string] = value;
        return true;
      },
    },
  );
  vi.spyOn(HTMLCanvasElement.prototype, 'getContext').mockReturnValue(context as never);
  vi.spyOn(Element.prototype, 'getBoundingClientRect').mockReturnValue(new DOMRect(0, 0, widthPx, heightPx));
  vi.stubGlobal(
    'ResizeObserver',
    class {
      observe(): void {}
      disconnect(): void {}
    },
  );
  vi.stubGlobal('matchMedia', (query: string) => ({
    matches: query.includes('reduced-motion'),
    addEventListener: () => undefined,
    removeEventListener: () => undefined,
  }));
  return painted;
}

import { text } from '../../../shared/text.js';

/** Section through a driver: the diameter runs from mid-surround to mid-surround (common practice; AES2-1984, from memory). */
export function PistonDrawing() {
  return (
    <figure className="flex flex-col gap-2">
      <svg viewBox="0 0 320 130" role="img" aria-label={text.sheet.results.pistonTitle} className="w-full max-w-sm">
        <g fill="none" stroke="var(--color-ink)" strokeWidth="2" strokeLinecap="round" strokeLinejoin="round">
          <path d="M20 62 H48 Q60 40 72 62 L138 104 H182 L248 62 Q260 40 272 62 H300" />
          <path d="M138 104 Q160 86 182 104" />
          <path d="M20 62 V70 L104 118 H216 L300 70 V62" strokeWidth="1" stroke="var(--color-edge)" />
        </g>
        <g stroke="var(--color-heather)" strokeWidth="1.5" fill="none">
          <path d="M60 51 V14 M260 51 V14" strokeDasharray="3 3" />
          <path d="M62 20 H258 M70 15 L62 20 L70 25 M250 15 L258 20 L250 25" />
        </g>
        <circle cx="60" cy="51" r="3" fill="var(--color-heather)" />
        <circle cx="260" cy="51" r="3" fill="var(--color-heather)" />
        <text x="160" y="15" textAnchor="middle" fontSize="12" fill="var(--color-ink)" fontFamily="var(--font-num)">
          d
        </text>
      </svg>
      <figcaption className="text-note text-soft">{text.sheet.results.pistonDrawing}</figcaption>
    </figure>
  );
}

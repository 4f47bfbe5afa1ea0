import { type ReactNode, useState } from 'react';
import { text } from '../../shared/text.js';
import { errorWords } from '../lib/error-words.js';
import { Button } from './button.js';

interface ErrorBarProps {
  error: unknown;
  /** The next step: a button or a link. */
  children?: ReactNode;
}

/** Sentence, place, next step, and the details with the reference number for whoever looks into it. */
export function ErrorBar({ error, children }: ErrorBarProps) {
  const { title, detail, requestId, technical } = errorWords(error);
  const [isCopied, setIsCopied] = useState(false);
  const copy = () => {
    const details = [title, detail, requestId && text.common.reference(requestId), window.location.href, technical];
    void navigator.clipboard.writeText(details.filter(Boolean).join('\n')).then(() => setIsCopied(true));
  };
  return (
    <div role="alert" className="border-s-4 border-out bg-out-wash px-4 py-3">
      <p className="font-semibold">
        <span aria-hidden className="text-out">
          ▲{' '}
        </span>
        {title}
      </p>
      {detail !== title && <p className="max-w-prose">{detail}</p>}
      <div className="mt-2 flex flex-wrap items-center gap-2">
        {children}
        <Button onClick={copy}>{isCopied ? text.common.copied : text.common.copyDetails}</Button>
        {requestId && <span className="font-num text-note text-soft">{text.common.reference(requestId)}</span>}
      </div>
    </div>
  );
}

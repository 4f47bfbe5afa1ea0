import { useRouteError } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { ApiError } from '../lib/api-error.js';
import { Button, ButtonLink } from './button.js';
import { ErrorBar } from './error-bar.js';
import { PageFrame } from './page-frame.js';

/** What a route shows when it, its data or its code could not be had: words, a way on, and the reference. */
export function RouteError() {
  const error = useRouteError();
  const isMissing = error instanceof ApiError && error.code === 'not-found';
  return (
    <PageFrame title={isMissing ? text.errors.pageMissingTitle : text.errors.unknownTitle}>
      <ErrorBar error={error}>
        {!isMissing && (
          <Button look="primary" onClick={() => window.location.reload()}>
            {text.errors.reload}
          </Button>
        )}
        <ButtonLink to="/">{text.errors.goHome}</ButtonLink>
      </ErrorBar>
    </PageFrame>
  );
}

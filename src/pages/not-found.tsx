import { text } from '../../shared/text.js';
import { ButtonLink } from '../components/button.js';
import { EmptyState } from '../components/empty-state.js';
import { PageFrame } from '../components/page-frame.js';

export function Component() {
  return (
    <PageFrame title={text.errors.pageMissingTitle}>
      <EmptyState title={text.errors.pageMissingDetail} action={<ButtonLink to="/">{text.errors.goHome}</ButtonLink>} />
    </PageFrame>
  );
}

import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { Button, ButtonLink } from '../components/button.js';
import { ErrorBar } from '../components/error-bar.js';
import { Loading } from '../components/loading.js';
import { PageFrame } from '../components/page-frame.js';
import { KeepDialog } from '../features/sheet/keep-dialog.js';
import { SheetName } from '../features/sheet/sheet-name.js';
import { SheetWorkspace } from '../features/sheet/sheet-workspace.js';
import { openTrySheet } from '../features/sheet/try-sheet.js';
import { hasHandedFiles } from '../lib/handed-files.js';
import { useMe } from '../lib/me.js';
import { browserStore } from '../lib/project-store/browser-store.js';
import { ProjectStoreProvider } from '../lib/project-store/store-context.js';
import { sheetQuery } from '../lib/project-store/store-queries.js';
import { useSessionState } from '../lib/session.js';
import { sheetSlots } from './sheet-slots.js';

/** A full sheet that lives only in this browser, and says so. */
export function Component() {
  return (
    <ProjectStoreProvider store={browserStore()}>
      <TryPage />
    </ProjectStoreProvider>
  );
}

function TryPage() {
  const store = browserStore();
  const [search] = useSearchParams();
  const opening = useQuery({
    queryKey: [store.key, 'try', search.has('sample')],
    queryFn: () => openTrySheet(store, search.has('sample')),
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: 0,
  });
  const sheet = useQuery({ ...sheetQuery(store, opening.data ?? ''), enabled: opening.data !== undefined });
  const error = opening.error ?? sheet.error;
  if (!sheet.data) {
    return (
      <PageFrame title={text.sheet.tryTitle} isTitleHidden>
        {error ? <ErrorBar error={error} /> : <Loading />}
      </PageFrame>
    );
  }
  const row = sheet.data;
  return (
    <SheetWorkspace
      key={row.id}
      sheet={row}
      opensUnpack={hasHandedFiles()}
      slots={sheetSlots}
      frame={(bar, panes) => (
        <PageFrame
          title={text.sheet.tryTitle}
          isTitleHidden
          isFull
          barContent={
            <>
              <SheetName sheet={row} />
              {bar}
              <KeepIt />
            </>
          }
        >
          <p className="shrink-0 border-b border-line bg-old-wash px-4 py-1 text-note text-old">
            {text.sheet.tryNotice}
          </p>
          {panes}
        </PageFrame>
      )}
    />
  );
}

/** Moves everything into the account; without one, the way to an account comes first. */
function KeepIt() {
  const { hint } = useSessionState();
  const me = useMe();
  const navigate = useNavigate();
  const client = useQueryClient();
  const [isAsking, setIsAsking] = useState(false);
  const [search] = useSearchParams();
  useEffect(() => {
    if (search.has('keep') && me) setIsAsking(true);
  }, [search, me]);
  if (!hint) {
    return (
      <ButtonLink to="/register?to=%2Ftry%3Fkeep" look="primary">
        {text.sheet.keepIt}
      </ButtonLink>
    );
  }
  return (
    <>
      <Button look="primary" onClick={() => setIsAsking(true)}>
        {text.sheet.keepIt}
      </Button>
      {isAsking && me && (
        <KeepDialog
          me={me}
          onClose={() => setIsAsking(false)}
          onKept={(path) => {
            client.removeQueries({ queryKey: [browserStore().key] });
            void navigate(path);
          }}
        />
      )}
    </>
  );
}

import { useQuery } from '@tanstack/react-query';
import { text } from '../../shared/text.js';
import { ErrorBar } from '../components/error-bar.js';
import { Loading } from '../components/loading.js';
import { PageFrame } from '../components/page-frame.js';
import { Section } from '../components/section.js';
import { DeviceList } from '../features/account/device-list.js';
import { ProfileForm } from '../features/account/profile-form.js';
import { ScreenSettings } from '../features/account/screen-settings.js';
import { meQuery } from '../lib/me.js';

export function Component() {
  const { data: me, error } = useQuery(meQuery);
  return (
    <PageFrame title={text.account.meTitle}>
      {error && <ErrorBar error={error} />}
      {!me && !error && <Loading />}
      {me && (
        <>
          <Section title={text.account.you}>
            <ProfileForm me={me} />
          </Section>
          <Section title={text.account.screen}>
            <ScreenSettings />
          </Section>
          <Section title={text.account.devices}>
            <DeviceList />
          </Section>
        </>
      )}
    </PageFrame>
  );
}

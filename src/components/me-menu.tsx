import { CircleUser } from 'lucide-react';
import { useNavigate } from 'react-router-dom';
import { z } from 'zod';
import { text } from '../../shared/text.js';
import { api } from '../lib/api.js';
import { useMe } from '../lib/me.js';
import { leaveAccountPreferences } from '../lib/preferences.js';
import { queryClient } from '../lib/query-client.js';
import { session } from '../lib/session.js';
import { Menu } from './menu.js';

/** Ends the session here and forgets what was fetched with it. */
async function signOut(leave: () => void | Promise<void>): Promise<void> {
  await api.post('/account/sign-out', {}, z.unknown()).catch(() => undefined); // already ended: the same outcome
  await leave();
  session.signedOut();
  leaveAccountPreferences();
  queryClient.clear();
}

export function MeMenu() {
  const me = useMe();
  const navigate = useNavigate();
  return (
    <Menu
      label={text.common.meMenu(me?.name ?? '')}
      isIconOnly
      entries={[
        { id: 'home', label: text.common.home, onAction: () => void navigate('/home') },
        { id: 'me', label: text.common.me, onAction: () => void navigate('/me') },
        { id: 'out', label: text.common.signOut, onAction: () => void signOut(() => navigate('/')) },
      ]}
    >
      <CircleUser size={22} aria-hidden />
    </Menu>
  );
}

import { queryOptions, useQuery } from '@tanstack/react-query';
import { type Me, MeSchema } from '../../shared/contracts/account.js';
import type { Team } from '../../shared/contracts/team.js';
import { api } from './api.js';
import { joinAccountPreferences } from './preferences.js';
import { sendPreferences, unsentPreferences } from './send-preferences.js';
import { session } from './session.js';

export const meQuery = queryOptions({
  queryKey: ['me'],
  queryFn: async ({ signal }): Promise<Me> => {
    const me = await api.get('/me', MeSchema, { signal });
    session.signedIn();
    const unsent = unsentPreferences();
    joinAccountPreferences({ ...me.preferences, ...unsent }, sendPreferences);
    if (Object.keys(unsent).length > 0) sendPreferences(unsent);
    return me;
  },
  staleTime: 60_000,
});

const TEAM_KEY = 'hummock.team';

/** The team chosen in the top bar: of this browser session, or the first; `?team=` in a link wins. */
export function chosenTeam(me: Me, search: string = window.location.search): Team | undefined {
  const wanted = new URLSearchParams(search).get('team') ?? sessionStorage.getItem(TEAM_KEY);
  return me.teams.find((team) => team.id === wanted) ?? me.teams[0];
}
export function chooseTeam(teamId: string): void {
  sessionStorage.setItem(TEAM_KEY, teamId);
}

/** The signed-in person, or undefined while unknown or signed out. Asks only where a session is likely. */
export function useMe(): Me | undefined {
  return useQuery({ ...meQuery, enabled: session.hint }).data;
}

import { z } from 'zod';
import { type Register, SessionSchema, type SignIn } from '../../../shared/contracts/account.js';
import { api } from '../../lib/api.js';
import { meQuery } from '../../lib/me.js';
import { queryClient } from '../../lib/query-client.js';
import { session } from '../../lib/session.js';

const Anything = z.unknown();

/** Signs in and fetches the person, so that the next page has them at once. */
export async function signIn(credentials: SignIn): Promise<void> {
  await api.post('/account/sign-in', credentials, Anything);
  queryClient.removeQueries({ queryKey: meQuery.queryKey });
  await queryClient.fetchQuery(meQuery);
  session.signedIn();
}
export const register = (input: Register) => api.post('/account/register', input, Anything);
export const verify = (code: string, password?: string) =>
  api.post('/account/verify', { code, ...(password !== undefined && { password }) }, Anything);
export const askForReset = (email: string) => api.post('/account/forgot', { email }, Anything);
export const resetPassword = (code: string, password: string) =>
  api.post('/account/reset', { code, password }, Anything);

const SessionsSchema = z.union([z.array(SessionSchema), z.object({ items: z.array(SessionSchema) })]);
export const sessionsQuery = {
  queryKey: ['me', 'sessions'],
  queryFn: async () => {
    const answer = await api.get('/me/sessions', SessionsSchema);
    return Array.isArray(answer) ? answer : answer.items;
  },
};

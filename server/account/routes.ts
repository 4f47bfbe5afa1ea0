import { type Request, type Response, Router } from 'express';
import {
  ForgotSchema,
  LetterSentSchema,
  MeSchema,
  RegisterSchema,
  ResetSchema,
  SignInSchema,
  VerifySchema,
} from '../../shared/contracts/account.js';
import type { MeService } from '../me/service.js';
import { answer } from '../middleware/answer.js';
import type { RateLimits } from '../middleware/rate-limits.js';
import type { SessionCookies } from './cookies.js';
import { deviceOf } from './device.js';
import type { AccountService, SignedIn } from './service.js';
import type { Sessions } from './sessions.js';

interface Parts {
  readonly account: AccountService;
  readonly sessions: Sessions;
  readonly cookies: SessionCookies;
  readonly me: MeService;
  readonly limits: RateLimits;
}

export function accountRouter({ account, sessions, cookies, me, limits }: Parts): Router {
  const router = Router();
  const device = (request: Request) => deviceOf(request.get('user-agent'));
  const origin = (request: Request) => request.ip ?? 'unknown';
  const welcome = async (response: Response, { personId, tokens }: SignedIn) => {
    cookies.set(response, tokens);
    answer(response, MeSchema, await me.read(personId));
  };

  router.post('/account/register', async (request, response) => {
    const input = RegisterSchema.parse(request.body);
    await limits.spend('register-origin', origin(request));
    await limits.spend('mail-address', input.email);
    cookies.setRegistration(response, await evenly(() => account.register(input)));
    answer(response, LetterSentSchema, { email: input.email }, 202);
  });
  router.post('/account/verify', async (request, response) => {
    const { code, password } = VerifySchema.parse(request.body);
    await limits.spend('code-origin', origin(request));
    const proof = { registration: cookies.registrationOf(request), password };
    const signedIn = await account.verify(code, proof, device(request));
    cookies.clearRegistration(response);
    await welcome(response, signedIn);
  });
  router.post('/account/sign-in', async (request, response) => {
    const input = SignInSchema.parse(request.body);
    await limits.spend('sign-in-origin', origin(request));
    const pair = `${input.email} ${origin(request)}`;
    await limits.spend('sign-in-pair', pair); // first: a place that has used up its own tries takes none from others
    await limits.spend('sign-in-address', input.email);
    const signedIn = await account.signIn(input, device(request));
    await limits.clear('sign-in-pair', pair); // a right password starts anew
    await welcome(response, signedIn);
  });
  router.post('/account/sign-out', async (request, response) => {
    await sessions.endByToken(cookies.refreshOf(request));
    cookies.clear(response);
    response.status(204).end();
  });
  router.post('/account/refresh', async (request, response) => {
    cookies.set(response, await sessions.refresh(cookies.refreshOf(request)));
    response.status(204).end();
  });
  router.post('/account/forgot', async (request, response) => {
    const { email } = ForgotSchema.parse(request.body);
    await limits.spend('mail-origin', origin(request));
    await limits.spend('mail-address', email);
    await account.forgot(email);
    answer(response, LetterSentSchema, { email }, 202);
  });
  router.post('/account/reset', async (request, response) => {
    const { code, password } = ResetSchema.parse(request.body);
    await limits.spend('code-origin', origin(request));
    await welcome(response, await account.reset(code, password, device(request)));
  });
  return router;
}

/** At least this long for every address, so that the time does not tell a known one from a new one. */
const EVEN_MS = 150;

async function evenly<T>(work: () => Promise<T>): Promise<T> {
  const [done] = await Promise.all([work(), new Promise((resolve) => setTimeout(resolve, EVEN_MS))]);
  return done;
}

import { expect, it } from 'vitest';
import { startApp } from './support/app.js';
import { makePerson } from './support/people.js';

const app = await startApp();
it('registers', async () => {
  const { client, me } = await makePerson(app, 'Ada');
  const answer = await client.get('/api/me');
  expect(answer.body).toEqual(me);
});

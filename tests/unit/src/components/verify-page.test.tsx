import { QueryClientProvider } from '@tanstack/react-query';
import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, expect, it, vi } from 'vitest';
import { queryClient } from '../../../../src/lib/query-client.js';
import { Component } from '../../../../src/pages/verify.js';

const WAIT = { timeout: 8_000 };
const CODE = 'a-code-of-a-letter-for-the-test';

/** A server that knows one password; without it, it answers as the real one does (tests/api/account.test.ts). */
function serverWith(password: string) {
  const asked: unknown[] = [];
  vi.stubGlobal('fetch', async (path: string, init?: RequestInit) => {
    if (path !== '/api/account/verify') return Response.json({}, { status: 404 });
    const body = JSON.parse(String(init?.body)) as { code: string; password?: string };
    asked.push(body);
    if (body.password === password) return Response.json({});
    const detail = body.password === undefined ? 'Write the password.' : 'This is another password.';
    const problem = { type: 'about:blank', title: 'T', status: 403, code: 'password-needed', detail, requestId: 'r' };
    return Response.json(problem, { status: 403 });
  });
  return asked;
}
function open() {
  const router = createMemoryRouter([{ path: '/verify/:code', Component }], { initialEntries: [`/verify/${CODE}`] });
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
}
const press = () => fireEvent.click(screen.getByRole('button', { name: 'Confirm the address' }));

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

it('asks for the password when the server does, says when it is another one, and confirms with the right one', async () => {
  const asked = serverWith('a quiet passphrase');
  open();
  expect(screen.queryByLabelText('Password')).toBeNull();
  press();
  const field = await screen.findByLabelText('Password', {}, WAIT);
  expect(screen.getByRole('alert').textContent).toContain('Write the password.');
  fireEvent.change(field, { target: { value: 'not this one' } });
  press();
  await vi.waitFor(() => expect(screen.getByRole('alert').textContent).toContain('This is another password.'), WAIT);
  expect(screen.getByRole('link', { name: 'Set a new password' })).toBeTruthy();
  fireEvent.change(field, { target: { value: 'a quiet passphrase' } });
  press();
  expect(await screen.findByText(/The address is confirmed/, {}, WAIT)).toBeTruthy();
  expect(asked).toEqual([
    { code: CODE },
    { code: CODE, password: 'not this one' },
    { code: CODE, password: 'a quiet passphrase' },
  ]);
}, 25_000);

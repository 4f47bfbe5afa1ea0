/** The browser tests need a running server; without one, every test would fail for a reason that is not its own. */
export default async function requireServer(): Promise<void> {
  const url = process.env.HUMMOCK_E2E_URL;
  if (!url) throw new Error('HUMMOCK_E2E_URL is not set. Run the browser tests by: npm test -- e2e');
  const answer = await fetch(new URL('/api/ready', url));
  if (!answer.ok) throw new Error(`${url} is not ready: it answers ${answer.status}.`);
}

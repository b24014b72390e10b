import { readDemo } from '../data/files.js';
import { spreadOf } from './quantiles.js';

/** The estimate route as the sheet asks it, one request after the other; `TRIMWICK_URL` names the running program. */
const base = process.env.TRIMWICK_URL ?? 'http://127.0.0.1:4310';
const requests = 60;

const signedIn = await fetch(`${base}/api/v1/session`, {
  method: 'POST',
  headers: { 'Content-Type': 'application/json' },
  body: JSON.stringify({ email: 'designer@brackenmoor.example', password: 'trim-the-wick-4310' }),
});
if (!signedIn.ok) throw new Error(`Sign-in answered ${String(signedIn.status)}: is the demo team loaded at ${base}?`);
const cookie = signedIn.headers
  .getSetCookie()
  .map((line) => line.split(';')[0])
  .join('; ');

for (const name of ['stall-lantern', 'driver-box', 'load-box'] as const) {
  const body = JSON.stringify({ assembly: readDemo(name) });
  const times: number[] = [];
  for (let i = 0; i < requests + 5; i++) {
    const began = performance.now();
    const answer = await fetch(`${base}/api/v1/estimates`, {
      method: 'POST',
      headers: { 'Content-Type': 'application/json', Cookie: cookie },
      body,
    });
    await answer.arrayBuffer();
    if (answer.status !== 200) throw new Error(`${name}: the route answered ${String(answer.status)}`);
    // The first few warm the threads up.
    if (i >= 5) times.push(performance.now() - began);
  }
  console.log(`POST /api/v1/estimates, ${name.padEnd(13)} ${spreadOf(times, 1)}`);
}

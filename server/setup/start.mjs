import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { ensureBuilt } from './build.mjs';
import { openDatabase } from './database.mjs';
import { runScript, SetupError } from './fail.mjs';
import { checkNode } from './node-version.mjs';
import { ensurePackages } from './packages.mjs';
import { root, trimwickHome } from './paths.mjs';
import { checkPortFree, endLeftover, migrate, Service, stopRequested, waitHealthy } from './service.mjs';

const port = Number(process.env.PORT || 4310);

function greet(demo) {
  console.log(`\nTrimwick is at http://127.0.0.1:${port}\n`);
  if (demo) {
    console.log('Demo sign-ins, password trim-the-wick-4310:');
    console.log('  Brackenmoor Lanterns    admin@ designer@ engineer@ reviewer@ viewer@brackenmoor.example');
    console.log('  Saltmarsh Instruments   engineer@saltmarsh.example\n');
  }
  console.log('Ctrl-C stops it.');
}

await runScript(async () => {
  checkNode();
  if (!Number.isInteger(port) || port < 1 || port > 65535)
    throw new SetupError(`PORT must be a port number, not “${process.env.PORT}”`);
  const home = trimwickHome();
  mkdirSync(home, { recursive: true });
  await endLeftover(home);
  await checkPortFree(port);
  await ensurePackages();
  await ensureBuilt();
  const stopping = stopRequested();
  const database = await openDatabase();
  let service;
  try {
    const env = { NODE_ENV: 'production', ...database.env, PORT: String(port), TRIMWICK_HOME: home };
    await migrate(env);
    service = new Service(
      process.execPath,
      [path.join(root, 'dist/server/main.js')],
      env,
      path.join(home, 'server.pid'),
    );
    await Promise.race([waitHealthy(port, service), stopping]);
    greet(database.demo);
    const end = await Promise.race([stopping, service.ended]);
    if (typeof end === 'object') throw new SetupError('The server ended by itself (see above)');
    console.log('\nStopping …');
  } finally {
    await service?.stop();
    await database.stop();
  }
});

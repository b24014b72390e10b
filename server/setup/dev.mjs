import { mkdirSync } from 'node:fs';
import { ensureBuilt } from './build.mjs';
import { openDatabase } from './database.mjs';
import { runScript } from './fail.mjs';
import { checkNode } from './node-version.mjs';
import { ensurePackages } from './packages.mjs';
import { trimwickHome } from './paths.mjs';
import { checkPortFree, migrate, Service, stopRequested, waitHealthy } from './service.mjs';

const port = Number(process.env.PORT || 4310);
const clientPort = Number(process.env.VITE_PORT || port + 1);

await runScript(async () => {
  checkNode();
  mkdirSync(trimwickHome(), { recursive: true });
  await checkPortFree(port);
  await checkPortFree(clientPort);
  await ensurePackages();
  await ensureBuilt(['server']);
  const stopping = stopRequested();
  const database = await openDatabase();
  const services = [];
  try {
    const env = {
      ...database.env,
      PORT: String(port),
      VITE_PORT: String(clientPort),
      TRIMWICK_HOME: trimwickHome(),
      NODE_ENV: 'development',
    };
    await migrate(env);
    services.push(new Service('npx', ['--no-install', 'tsx', 'watch', 'server/main.ts'], env));
    await waitHealthy(port, services[0]);
    services.push(new Service('npx', ['--no-install', 'vite'], env));
    console.log(`\nTrimwick, reloading as you edit: http://127.0.0.1:${clientPort}\nCtrl-C stops it.`);
    await Promise.race([stopping, ...services.map((service) => service.ended)]);
  } finally {
    await Promise.all(services.map((service) => service.stop()));
    await database.stop();
  }
});

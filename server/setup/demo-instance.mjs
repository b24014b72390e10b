import path from 'node:path';
import { freePort } from './postgres.mjs';
import { migrate, waitHealthy, webProcess } from './service.mjs';

/**
 * The built program on a free port, with the demo teams in the given empty database: what browser tests and benchmarks
 * look at.
 *
 * @param {{ applicationUrl: string, ownerUrl: string, home: string }} where
 */
export async function startDemoInstance({ applicationUrl, ownerUrl, home }) {
  const port = await freePort();
  const env = {
    DATABASE_URL: applicationUrl,
    DATABASE_OWNER_URL: ownerUrl,
    TRIMWICK_DEMO: '1',
    TRIMWICK_HOME: home,
    HOST: '127.0.0.1',
    PORT: String(port),
    NODE_ENV: 'production',
  };
  const base = `http://127.0.0.1:${port}`;
  await migrate(env);
  const service = webProcess(env, path.join(home, 'server.pid'));
  try {
    await waitHealthy(base, service);
  } catch (error) {
    await service.stop();
    throw error;
  }
  return { base, stop: () => service.stop() };
}

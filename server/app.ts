import { existsSync } from 'node:fs';
import { createRequire } from 'node:module';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import compression from 'compression';
import cookieParser from 'cookie-parser';
import express, { Router, type Express } from 'express';
import { rateLimit } from 'express-rate-limit';
import helmet from 'helmet';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import type { AppContext } from './context.js';
import { DomainError } from './errors.js';
import { problems, unknownRoute } from './middleware/problems.js';
import { sameOrigin } from './middleware/same-origin.js';
import { openApiDocument } from './openapi.js';
import { allRoutes } from './routes/all.js';
import { mountRoutes } from './routes/define.js';

/** The built client, from the sources and from the build alike. */
const clientFolder = ['../dist/client', '../client']
  .map((folder) => fileURLToPath(new URL(folder, import.meta.url)))
  .find((folder) => existsSync(path.join(folder, 'index.html')));

const yearSeconds = 31_536_000;

function addDocs(app: Express): void {
  const swaggerFolder = path.dirname(createRequire(import.meta.url).resolve('swagger-ui-dist/package.json'));
  const document = JSON.stringify(openApiDocument(allRoutes));
  app.get('/api/openapi.json', (_request, response) => {
    response.type('application/json').send(document);
  });
  app.get('/api/docs/swagger-initializer.js', (_request, response) => {
    response
      .type('text/javascript')
      .send(
        `window.ui = SwaggerUIBundle({ url: '/api/openapi.json', dom_id: '#swagger-ui', validatorUrl: null, ` +
          `presets: [SwaggerUIBundle.presets.apis] });`,
      );
  });
  app.use('/api/docs', express.static(swaggerFolder));
}

/** Files with a hash in their name never change; the page that names them always may. */
function addClient(app: Express): void {
  if (clientFolder === undefined) return;
  app.use(
    '/assets',
    express.static(path.join(clientFolder, 'assets'), { immutable: true, maxAge: yearSeconds * 1000 }),
    // A file of an earlier build is gone; the page in its place would only confuse a browser that wants a script.
    unknownRoute,
  );
  app.use(express.static(clientFolder, { index: false, maxAge: 0 }));
  app.get('/{*path}', (request, response, next) => {
    if (!request.accepts('html')) {
      next();
      return;
    }
    // With a root of its own, so that a checkout below a folder like `.work` is served too.
    response.set('Cache-Control', 'no-cache').sendFile('index.html', { root: clientFolder });
  });
}

/** The Express application on a context: security headers, API, documentation, client, problems. */
export function makeApp(context: AppContext, log: Logger): Express {
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', 'loopback');
  app.use(
    helmet({
      contentSecurityPolicy: {
        directives: {
          defaultSrc: ["'self'"],
          scriptSrc: ["'self'"],
          // Plotly writes its styles into the page.
          styleSrc: ["'self'", "'unsafe-inline'"],
          imgSrc: ["'self'", 'data:', 'blob:'],
          connectSrc: ["'self'"],
          fontSrc: ["'self'", 'data:'],
          objectSrc: ["'none'"],
          frameAncestors: ["'none'"],
          upgradeInsecureRequests: null,
        },
      },
      // Behind https the proxy says so; on loopback there is none.
      strictTransportSecurity: false,
    }),
  );
  app.use(
    pinoHttp({
      logger: log,
      // Failures are logged once, where they become problems.
      customLogLevel: () => 'debug',
      serializers: {
        req: ({ method, url }: { method: string; url: string }) => ({ method, url }),
        res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
      },
    }),
  );
  app.use(compression());
  addDocs(app);
  const api = Router();
  api.use((_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  api.use(sameOrigin);
  api.use(cookieParser());
  api.use(express.json({ limit: '5mb' }));
  api.post(
    '/session',
    rateLimit({
      windowMs: 15 * 60_000,
      limit: 60,
      skipSuccessfulRequests: true,
      standardHeaders: 'draft-7',
      legacyHeaders: false,
      handler: () => {
        throw new DomainError(429, 'too-many', 'Too many failed sign-ins from here: try again in 15 min');
      },
    }),
  );
  mountRoutes(api, allRoutes, context);
  app.use('/api/v1', api);
  app.use('/api', unknownRoute);
  addClient(app);
  app.use(unknownRoute);
  app.use(problems(log));
  return app;
}

import helmet from '@fastify/helmet';
import multipart from '@fastify/multipart';
import { type DynamicModule, Module } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import { FastifyAdapter, type NestFastifyApplication } from '@nestjs/platform-fastify';
import type { FastifyInstance, FastifyReply } from 'fastify';
import { InProcessJobs } from '#libs/jobs/in-process-jobs.js';
import { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import { openStore } from '#libs/store/open-store.js';
import { hasAdministrator } from '#libs/store/people.js';
import { Store } from '#libs/store/store.js';
import { type Registered, refuseUndeclared, routesOf } from './declared-routes.js';
import { DemoController } from './demo/demo-controller.js';
import { loadDemo } from './demo/load-demo.js';
import { ExportsController } from './exports/exports-controller.js';
import { FiguresController } from './exports/figures-controller.js';
import { PlanImportsController } from './exports/plan-imports-controller.js';
import { SiteImportsController } from './exports/site-imports-controller.js';
import { HealthController } from './health/health-controller.js';
import { HomeController } from './home/home-controller.js';
import { JobsController } from './jobs/jobs-controller.js';
import { KeptMapsController } from './kept-maps/kept-maps-controller.js';
import { LinkedController } from './links/linked-controller.js';
import { LinksController } from './links/links-controller.js';
import { foreignCheck } from './local-requests.js';
import { Once, replay } from './once/once.js';
import { OpenApi } from './open-api.js';
import { OpenApiController } from './open-api-controller.js';
import { PageController } from './page/page-controller.js';
import { PageFiles } from './page/page-files.js';
import { PapersController } from './papers/papers-controller.js';
import { AccountPageController } from './people/account-page-controller.js';
import { Accounts, type Reach } from './people/accounts.js';
import { Admission } from './people/admission.js';
import type { Confirm } from './people/confirm.js';
import { Keys } from './people/keys.js';
import { KeysController } from './people/keys-controller.js';
import { type HashCost, PRESENT_COST } from './people/password-hash.js';
import { People } from './people/people.js';
import { PeopleController } from './people/people-controller.js';
import { PeoplePageController } from './people/people-page-controller.js';
import { SessionController } from './people/session-controller.js';
import { SignInController } from './people/sign-in-controller.js';
import { planRunner } from './planning/plan-runner.js';
import { Planning } from './planning/planning.js';
import { PlanningController } from './planning/planning-controller.js';
import { describeError, ProblemFilter } from './problem-filter.js';
import { IMPORT, importRunner, wantedPlaces } from './records/import-jobs.js';
import { RecordImport } from './records/record-import.js';
import { RecordsController } from './records/records-controller.js';
import { Spool } from './records/spool.js';
import { UploadIntake } from './records/upload-intake.js';
import { ReevaluationController } from './reevaluation/reevaluation-controller.js';
import { refuseOtherBodies, takesFile } from './request-bodies.js';
import { DifferencesController } from './review/differences-controller.js';
import { ReviewController } from './review/review-controller.js';
import { ReviewPageController } from './review/review-page-controller.js';
import { Reviews } from './review/reviews.js';
import { VerifyController } from './review/verify-controller.js';
import { ServerLog } from './server-log.js';
import { isLocal, type Settings } from './settings.js';
import { SitesController } from './sites/sites-controller.js';
import { CONFIRM, JOBS } from './tokens.js';
import { UnknownController } from './unknown-controller.js';

/** What may stand in for the program's own, in tests. */
export interface ServerParts {
  /** compiled file of the worker threads */
  workerFile: URL;
  /** folder of the built page */
  pageFolder: URL;
  controllers: NonNullable<DynamicModule['controllers']>;
  /** what guessing a password costs */
  hashCost: HashCost;
}

const CONTROLLERS: ServerParts['controllers'] = [
  PageController,
  HomeController,
  HealthController,
  SitesController,
  RecordsController,
  PlanningController,
  ReviewController,
  ReviewPageController,
  DifferencesController,
  ReevaluationController,
  VerifyController,
  KeptMapsController,
  PapersController,
  ExportsController,
  FiguresController,
  SiteImportsController,
  PlanImportsController,
  JobsController,
  SessionController,
  PeopleController,
  KeysController,
  SignInController,
  AccountPageController,
  PeoplePageController,
  LinksController,
  LinkedController,
  DemoController,
  OpenApiController,
  UnknownController,
];

@Module({})
class ServerModule {}

/**
 * Opens the store, wires the server and checks that every route says who may use it; it does not listen yet.
 * @param settings from `readSettings`
 * @param parts what stands in for the program's own
 * @returns the application; closing it ends the jobs, the threads and the store
 */
export async function createServer(
  settings: Settings,
  {
    workerFile = new URL('./planning/planning-worker.js', import.meta.url),
    pageFolder = new URL('../web/', import.meta.url),
    controllers = CONTROLLERS,
    hashCost = PRESENT_COST,
  }: Partial<ServerParts> = {},
): Promise<NestFastifyApplication> {
  const log = new ServerLog(settings.logLevel);
  const store = await openStore(settings.dbUrl);
  await refuseUnguarded(settings, store);
  const spool = new Spool(settings.spoolDir, settings.uploadBytes);
  await spool.prepare(await wantedPlaces(store));
  const pool = new WorkerPool(workerFile, (error) => log.fault(error));
  const runner = planRunner(store, pool);
  const importer = new RecordImport(store, pool);
  const jobs = new InProcessJobs({
    store,
    runners: { plan: runner, assess: runner, [IMPORT]: importRunner({ store, spool, importer }) },
    // A file is read while a plan is made.
    atOnce: 2,
    leaseS: settings.jobLeaseS,
    describe: describeError,
    onFault: (error) => log.fault(error),
  });
  const accounts = new Accounts(store, reachOf(settings), hashCost);
  let demo: Promise<void> = Promise.resolve();
  const module: DynamicModule = {
    module: ServerModule,
    controllers,
    providers: [
      { provide: Store, useValue: store },
      { provide: Accounts, useValue: accounts },
      { provide: Once, useValue: new Once(store) },
      { provide: Spool, useValue: spool },
      { provide: WorkerPool, useValue: pool },
      { provide: JOBS, useValue: jobs },
      { provide: OpenApi, useValue: new OpenApi() },
      { provide: PageFiles, useValue: new PageFiles(pageFolder) },
      { provide: RecordImport, useValue: importer },
      UploadIntake,
      Planning,
      Reviews,
      { provide: CONFIRM, useValue: confirmBy(accounts) },
      People,
      Keys,
      {
        provide: 'closing',
        useValue: {
          onApplicationShutdown: async () => {
            await jobs.close();
            await pool.close();
            await demo;
            await store.close();
          },
        },
      },
    ],
  };
  const app = await serve(module, { settings, log });
  if (settings.demo) {
    demo = loadDemo({ store, spool, importer, planning: app.get(Planning) }).catch((error) => log.fault(error));
  }
  return app;
}

/**
 * Beyond this machine everything would lie open to whoever finds the server.
 * @throws Error where nobody could sign in
 */
async function refuseUnguarded(settings: Settings, store: Store): Promise<void> {
  if (isLocal(settings) || (await store.read(hasAdministrator))) return;
  await store.close();
  throw new Error(
    `HOST ${settings.host}${settings.origin === null ? '' : `, ORIGIN ${settings.origin}`}: others reach this server, ` +
      'and nobody has an account; add an administrator first (npm run -s add-administrator)',
  );
}

function reachOf(settings: Settings): Reach {
  return { isLocal: isLocal(settings), isSecure: settings.origin?.startsWith('https:') ?? false };
}

async function serve(
  module: DynamicModule,
  { settings, log }: { settings: Settings; log: ServerLog },
): Promise<NestFastifyApplication> {
  const adapter = new FastifyAdapter({
    bodyLimit: 1_000_000,
    forceCloseConnections: 'idle',
    // An address that cannot be decoded never reaches a route, nor the filter.
    frameworkErrors: (error: Error, _request: unknown, reply: FastifyReply) => {
      const problem = describeError(error);
      reply.status(problem.status).type('application/problem+json').send(JSON.stringify(problem));
    },
  });
  const registered: Registered[] = [];
  const fastify = adapter.getInstance() as unknown as FastifyInstance;
  fastify.addHook('onRoute', ({ method, url }) => {
    for (const one of [method].flat()) registered.push({ method: one, path: url });
  });
  const app = await NestFactory.create<NestFastifyApplication>(module, adapter, { logger: log, bodyParser: false });
  app.useGlobalFilters(new ProblemFilter(log));
  const accounts = app.get(Accounts);
  const admission = new Admission((request) => accounts.recognise(request));
  await harden(fastify, { settings, log, admission, once: app.get(Once) });
  await app.init();
  const routes = routesOf(app);
  refuseUndeclared(routes, registered);
  admission.learn(routes);
  app.get(OpenApi).describe(app);
  return app;
}

async function harden(
  fastify: FastifyInstance,
  { settings, log, admission, once }: { settings: Settings; log: ServerLog; admission: Admission; once: Once },
): Promise<void> {
  // Served by plain http on this machine: asking a browser for https would leave the page blank.
  await fastify.register(helmet, {
    hsts: false,
    contentSecurityPolicy: { directives: { 'upgrade-insecure-requests': null } },
  });
  await fastify.register(multipart, {
    limits: { fileSize: settings.uploadBytes, files: 1, fields: 10, fieldSize: 100_000, parts: 11 },
  });
  refuseOtherBodies(fastify);
  const refuseForeign = foreignCheck(settings);
  fastify.addHook('onRequest', async (request, reply) => {
    refuseForeign(request);
    await admission.admit(request, reply);
    return reply.sent ? reply : undefined;
  });
  fastify.addHook('preHandler', async (request, reply) => {
    // A file is known by its hash, once it was received; its route asks then.
    if (takesFile(request)) return;
    const answered = await once.begin(request, request.body);
    return answered === null ? undefined : replay(reply, answered).send(answered.body);
  });
  fastify.addHook('onSend', async (request, reply, payload) => once.end(request, reply, payload));
  fastify.addHook('onResponse', async (request, reply) => {
    const route = request.routeOptions.url ?? 'none';
    log.answered({ method: request.method, route, status: reply.statusCode, ms: Math.round(reply.elapsedTime) });
  });
}

/** As long as nobody has a password, being at this machine is what confirms an approval. */
function confirmBy(accounts: Accounts): Confirm {
  return (actor, password) => accounts.confirm(actor, password ?? '');
}

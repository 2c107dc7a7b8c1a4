import type { INestApplication } from '@nestjs/common';
import type { OpenAPIObject } from '@nestjs/swagger';
import { routesOf } from './declared-routes.js';
import { EXPORT_PARTS } from './exports/exports-api.js';
import { ANSWER_SCHEMAS, OPEN_API_PARTS } from './open-api-parts.js';
import { PEOPLE_PARTS, PEOPLE_SCHEMAS } from './people/people-api.js';
import { REEVALUATION_PARTS } from './reevaluation/reevaluation-api.js';
import { REVIEW_PARTS, REVIEW_SCHEMAS } from './review/review-api.js';

const PARTS = { ...OPEN_API_PARTS, ...REVIEW_PARTS, ...EXPORT_PARTS, ...PEOPLE_PARTS, ...REEVALUATION_PARTS };

type Operation = { summary?: string; parameters?: object[]; requestBody?: object; responses: Record<string, object> };

/** The description of the API, made from the routes when it is first asked for: its maker takes half a second to load. */
export class OpenApi {
  #app: INestApplication | null = null;
  #document: Promise<OpenAPIObject> | null = null;

  /** @param app the application it describes, before it listens */
  describe(app: INestApplication): void {
    this.#app = app;
  }

  /** The document, OpenAPI 3.0. */
  document(): Promise<OpenAPIObject> {
    if (this.#app === null) throw new Error('the API is described before it is made');
    this.#document ??= describeRoutes(this.#app);
    return this.#document;
  }
}

async function describeRoutes(app: INestApplication): Promise<OpenAPIObject> {
  const { DocumentBuilder, SwaggerModule } = await import('@nestjs/swagger');
  const about = new DocumentBuilder()
    .setTitle('Varwright')
    .setDescription('Plans capacitor banks for power-factor correction, from the meter’s record to the proposal.')
    .setVersion('1')
    .addBearerAuth({ type: 'http', scheme: 'bearer', description: 'an API key' }, 'key')
    .addCookieAuth('varwright-session', { type: 'apiKey', description: 'a session' }, 'session')
    .build();
  const document = SwaggerModule.createDocument(app, about);
  document.components = {
    ...document.components,
    schemas: { ...document.components?.schemas, ...ANSWER_SCHEMAS, ...REVIEW_SCHEMAS, ...PEOPLE_SCHEMAS },
  };
  for (const { method, path, declared } of routesOf(app)) {
    const template = path.replace(/:(\w+)/g, '{$1}');
    const item = document.paths[template] as Record<string, Operation> | undefined;
    const operation = item?.[method.toLowerCase()];
    if (operation === undefined) continue;
    const { parameters = [], responses, ...part } = PARTS[`${method.toLowerCase()} ${template}`] ?? {};
    Object.assign(operation, part, {
      summary: declared?.does ?? '',
      ...(declared?.role ? { description: `Needs the role ${declared.role}, or one that may do more.` } : {}),
      ...(declared?.role ? { security: [{ key: [] }, { session: [] }] } : {}),
      parameters: [...(operation.parameters ?? []), ...parameters, ...(method === 'POST' ? [ONCE] : [])],
      responses: { ...(responses ?? operation.responses), default: REFUSED },
    });
  }
  delete document.paths['/api/{path}'];
  delete document.paths['/api/*'];
  delete document.paths['/page/{path}'];
  delete document.paths['/page/*'];
  return document;
}

const ONCE = {
  in: 'header',
  name: 'Idempotency-Key',
  description: 'any key of the client’s own; the same request under it again is answered with the first answer',
  required: false,
  schema: { type: 'string', maxLength: 200 },
};

const REFUSED = {
  description: 'An error, naming what is wrong and where.',
  content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
};

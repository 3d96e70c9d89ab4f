import { OpenAPIRegistry, OpenApiGeneratorV31 } from '@asteasolutions/zod-to-openapi';
import { z } from 'zod';
import { paths } from '../../paths';
import { outlookAnswerSchema, outlookQuerySchema } from '../outlook/outlookApi';
import {
  errorAnswerSchema,
  moonAnswerSchema,
  windowsAnswerSchema,
} from '../windows/calculatorAnswers';
import { moonRequestSchema, windowsRequestSchema } from '../windows/calculatorSchemas';
import { linkAnswerSchema, linkRequestSchema } from '../windows/linkSchemas';

/** A request that anybody may send; what it takes and gives are the schemas that check and type it. */
interface OpenCalculator {
  path: string;
  summary: string;
  request: z.ZodType;
  answer: z.ZodType;
}

const CALCULATORS: readonly OpenCalculator[] = [
  {
    path: paths.api.moon,
    summary: 'Where the Moon and the Sun stand for one site at given instants.',
    request: moonRequestSchema,
    answer: moonAnswerSchema,
  },
  {
    path: paths.api.windows,
    summary: 'When two to sixteen stations have the Moon in common, and why not at other hours.',
    request: windowsRequestSchema,
    answer: windowsAnswerSchema,
  },
  {
    path: paths.api.link,
    summary: 'How well two stations hear each other over the Moon at one instant, and why.',
    request: linkRequestSchema,
    answer: linkAnswerSchema,
  },
];

const PLAN_CALENDARS: readonly [path: string, summary: string, names: string[]][] = [
  [
    paths.activityCalendar('{slug}'),
    'Every slot of the published plan of an activity, as a calendar to subscribe to.',
    ['slug'],
  ],
  [
    paths.activityStationCalendar('{slug}', 'CALL').replace('CALL', '{callSign}'),
    'The slots of one station in a published plan, as a calendar to subscribe to.',
    ['slug', 'callSign'],
  ],
];

const REFUSALS = {
  400: 'The input is not valid; every problem is named with its path.',
  413: 'The body is too large.',
  415: 'The body is not application/json.',
  429: 'Too many requests from this client; Retry-After says when to come back.',
} as const;

let document: unknown;

/** The OpenAPI 3.1 document of the open API, made from the schemas that check its input. */
export function openApiDocument(): unknown {
  document ??= buildDocument();
  return document;
}

function refusals(...statuses: (keyof typeof REFUSALS)[]) {
  return Object.fromEntries(
    statuses.map((status) => [
      status,
      {
        description: REFUSALS[status],
        content: { 'application/json': { schema: errorAnswerSchema } },
      },
    ]),
  );
}

function buildDocument(): unknown {
  const registry = new OpenAPIRegistry();
  for (const { path, summary, request, answer } of CALCULATORS) {
    registry.registerPath({
      method: 'post',
      path,
      summary,
      tags: ['Open calculators'],
      security: [],
      request: { body: { required: true, content: { 'application/json': { schema: request } } } },
      responses: {
        200: { description: 'The answer.', content: { 'application/json': { schema: answer } } },
        ...refusals(400, 413, 415, 429),
      },
    });
  }
  registry.registerPath({
    method: 'get',
    path: paths.api.outlook,
    summary:
      'The year ahead between two regions, stations or places: day by day, and the best weekends.',
    tags: ['Open calculators'],
    security: [],
    request: { query: outlookQuerySchema },
    responses: {
      200: {
        description: 'The answer.',
        content: { 'application/json': { schema: outlookAnswerSchema } },
      },
      ...refusals(400, 429),
    },
  });
  for (const [path, summary, names] of PLAN_CALENDARS) {
    registry.registerPath({
      method: 'get',
      path,
      summary,
      tags: ['Published plans'],
      security: [],
      request: { params: z.object(Object.fromEntries(names.map((name) => [name, z.string()]))) },
      responses: {
        200: {
          description: 'An iCalendar file (RFC 5545). What was taken out stays as cancelled.',
          content: { 'text/calendar': { schema: z.string() } },
        },
        404: { description: 'There is no such published plan, or no such station in it.' },
      },
    });
  }
  return new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Echotide',
      version: '1',
      description:
        'Moonbounce geometry and windows. Names carry their unit; instants are ISO 8601 in UTC with Z.',
    },
    servers: [{ url: '/' }],
  });
}

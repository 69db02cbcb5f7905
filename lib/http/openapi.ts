import { z } from 'zod';
import { axisEdit, axisInput } from '../schemas/axis';
import {
  checkRequest,
  convertRequest,
  parseRequest,
  reduceRequest,
  tuneRequest,
} from '../schemas/calculation';
import {
  applyInput,
  approveInput,
  createChangeInput,
  issueInput,
  remarkInput,
  rollBackInput,
  updateChangeInput,
  verifyInput,
} from '../schemas/change';
import { keepGainSetInput } from '../schemas/gain-set';
import { machineEdit, machineInput } from '../schemas/machine';
import { changePasswordInput, setUpInput, signInInput } from '../schemas/session';
import { tokenInput } from '../schemas/token';

interface Operation {
  readonly method: 'get' | 'post' | 'patch' | 'delete';
  readonly path: string;
  readonly summary: string;
  readonly body?: z.ZodType;
  readonly success: number;
}

/** Every operation of the public API, in the order in which the readable page shows them. */
export const OPERATIONS: readonly Operation[] = [
  {
    method: 'post',
    path: '/session',
    summary: 'Sign in; answers with the session cookie',
    body: signInInput,
    success: 200,
  },
  { method: 'get', path: '/session', summary: 'Who am I', success: 200 },
  { method: 'delete', path: '/session', summary: 'Sign out', success: 204 },
  {
    method: 'post',
    path: '/session/password',
    summary: 'Change the password; ends every session',
    body: changePasswordInput,
    success: 200,
  },
  {
    method: 'post',
    path: '/set-up',
    summary: 'First run: the organisation and its admin',
    body: setUpInput,
    success: 201,
  },
  {
    method: 'post',
    path: '/tokens',
    summary: 'Make a bearer token; shown once',
    body: tokenInput,
    success: 201,
  },
  {
    method: 'post',
    path: '/plants/parse',
    summary: 'Read a plant from text',
    body: parseRequest,
    success: 200,
  },
  {
    method: 'post',
    path: '/plants/reduce',
    summary: 'Reduce a plant to a simpler model',
    body: reduceRequest,
    success: 200,
  },
  {
    method: 'get',
    path: '/rules',
    summary: 'The tuning rules with types, validity and source',
    success: 200,
  },
  { method: 'post', path: '/tune', summary: 'Gains by a published rule', body: tuneRequest, success: 200 },
  {
    method: 'post',
    path: '/check',
    summary: 'Stability, margins, responses and verdict',
    body: checkRequest,
    success: 200,
  },
  {
    method: 'post',
    path: '/convert',
    summary: 'To a device’s form and units, or back',
    body: convertRequest,
    success: 200,
  },
  { method: 'get', path: '/machines', summary: 'Machines with their axes', success: 200 },
  { method: 'post', path: '/machines', summary: 'Add a machine', body: machineInput, success: 201 },
  { method: 'get', path: '/machines/{machine}', summary: 'One machine', success: 200 },
  {
    method: 'patch',
    path: '/machines/{machine}',
    summary: 'Edit a machine',
    body: machineEdit,
    success: 200,
  },
  { method: 'get', path: '/axes', summary: 'Axes by tag (?limit&after&machine)', success: 200 },
  { method: 'post', path: '/axes', summary: 'Add an axis', body: axisInput, success: 201 },
  { method: 'get', path: '/axes/{axis}', summary: 'One axis with its load cases', success: 200 },
  { method: 'patch', path: '/axes/{axis}', summary: 'Edit an axis', body: axisEdit, success: 200 },
  {
    method: 'get',
    path: '/axes/{axis}/gain-sets',
    summary: 'Versions, newest first (?limit&after)',
    success: 200,
  },
  {
    method: 'post',
    path: '/axes/{axis}/gain-sets',
    summary: 'Keep gains as the next version',
    body: keepGainSetInput,
    success: 201,
  },
  {
    method: 'get',
    path: '/changes',
    summary: 'Changes, newest first (?limit&after&state&axis)',
    success: 200,
  },
  { method: 'post', path: '/changes', summary: 'Draft a change', body: createChangeInput, success: 201 },
  { method: 'get', path: '/changes/{change}', summary: 'One change with its events', success: 200 },
  {
    method: 'patch',
    path: '/changes/{change}',
    summary: 'Edit a draft or returned change',
    body: updateChangeInput,
    success: 200,
  },
  { method: 'get', path: '/changes/{change}/sheet', summary: 'The technician’s sheet', success: 200 },
  { method: 'post', path: '/changes/{change}/submit', summary: 'Submit for signature', success: 200 },
  {
    method: 'post',
    path: '/changes/{change}/approve',
    summary: 'Sign, with the password again',
    body: approveInput,
    success: 200,
  },
  {
    method: 'post',
    path: '/changes/{change}/return',
    summary: 'Return with a remark',
    body: remarkInput,
    success: 200,
  },
  {
    method: 'post',
    path: '/changes/{change}/withdraw',
    summary: 'Withdraw with a remark',
    body: remarkInput,
    success: 200,
  },
  {
    method: 'post',
    path: '/changes/{change}/issue',
    summary: 'Issue to a technician, or to any',
    body: issueInput,
    success: 200,
  },
  {
    method: 'post',
    path: '/changes/{change}/apply',
    summary: 'Record as-found and as-left',
    body: applyInput,
    success: 200,
  },
  {
    method: 'post',
    path: '/changes/{change}/verify',
    summary: 'Record the test’s result',
    body: verifyInput,
    success: 200,
  },
  {
    method: 'post',
    path: '/changes/{change}/roll-back',
    summary: 'Record that the old values are back',
    body: rollBackInput,
    success: 200,
  },
];

const PROBLEM = { description: 'Problem details (RFC 9457)', content: { 'application/problem+json': {} } };

function operationObject({ path, summary, body, success, method }: Operation) {
  const names = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
  const answer =
    success === 204 ? { description: 'Done' } : { description: 'Done', content: { 'application/json': {} } };
  return {
    operationId: `${method}${path.replace(/[^a-z]+(\w?)/gi, (_, next: string) => next.toUpperCase())}`,
    summary,
    parameters: names.map((name) => ({
      name,
      in: 'path',
      required: true,
      schema: { type: 'string', format: 'uuid' },
    })),
    ...(body
      ? {
          requestBody: {
            required: true,
            content: {
              'application/json': { schema: z.toJSONSchema(body, { io: 'input', unrepresentable: 'any' }) },
            },
          },
        }
      : {}),
    responses: { [success]: answer, default: PROBLEM },
  };
}

/** The OpenAPI 3.1 description, drawn from the schemas that read the requests. */
export function openApiDocument(serverUrl: string) {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const operation of OPERATIONS) {
    paths[operation.path] ??= {};
    paths[operation.path][operation.method] = operationObject(operation);
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Fettle', version: '0.1.0', license: { name: 'MIT', identifier: 'MIT' } },
    servers: [{ url: `${serverUrl}/api/v1` }],
    components: {
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: 'fettle_session' },
        token: { type: 'http', scheme: 'bearer' },
      },
    },
    security: [{ session: [] }, { token: [] }],
    paths,
  };
}

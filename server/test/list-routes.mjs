// Prints every route and socket handler of the built server as JSON, read from what its decorators say: run by
// route-table.ts in a process of its own, since jest transforms what it loads.
import 'reflect-metadata';
import { RequestMethod } from '@nestjs/common';
import { AppModule } from '../dist/app.module.js';
import { ACCESS } from '../dist/platform/auth/access.decorators.js';
import { IDEMPOTENT } from '../dist/platform/idempotency/idempotent-options.js';

// Names of Nest's own metadata (its constants are not exported).
const [PATH, METHOD, ARGUMENTS] = ['path', 'method', '__routeArguments__'];
const [GATEWAY, MESSAGE] = ['websockets:is_gateway', 'message'];
const argumentKinds = { 3: 'body', 4: 'query', 5: 'param' };

const seen = new Set();
const classes = { controllers: new Set(), gateways: new Set() };

/** Walks modules as Nest does: classes, dynamic modules, forward references. */
async function visit(entry) {
  const found = await entry;
  const module = found?.forwardRef?.() ?? found;
  if (module === undefined || seen.has(module)) return;
  seen.add(module);
  const type = module.module ?? module;
  const part = (key) => [...(Reflect.getMetadata(key, type) ?? []), ...(module[key] ?? [])];
  for (const controller of part('controllers')) classes.controllers.add(controller);
  for (const provider of part('providers')) {
    const made = provider.useClass ?? provider;
    if (typeof made === 'function' && Reflect.getMetadata(GATEWAY, made)) classes.gateways.add(made);
  }
  for (const imported of part('imports')) await visit(imported);
  if (module.module !== undefined) await visit(module.module);
}

function handlers(type) {
  return Object.getOwnPropertyNames(type.prototype)
    .filter((name) => name !== 'constructor' && typeof type.prototype[name] === 'function')
    .map((name) => ({ name, handler: type.prototype[name] }));
}

const accessOf = (type, handler) =>
  Reflect.getMetadata(ACCESS, handler) ?? Reflect.getMetadata(ACCESS, type) ?? null;

/** Places in a schema where an object lets unknown fields through. */
function loosePlaces(schema, path = '', depth = 0) {
  const definition = schema?._zod?.def;
  if (definition === undefined || depth > 12) return [];
  const inner = (child, name) => loosePlaces(child, `${path}.${name}`, depth + 1);
  const own =
    definition.type === 'object' && definition.catchall?._zod.def.type !== 'never' ? [path || '.'] : [];
  const children = [
    ...Object.entries(definition.shape ?? {}).map(([name, child]) => inner(child, name)),
    ...(definition.options ?? []).map((child, n) => inner(child, `|${n}`)),
    ...['element', 'innerType', 'in', 'out', 'valueType', 'left', 'right'].map((key) =>
      inner(definition[key], key),
    ),
    ...(definition.items ?? []).map((child, n) => inner(child, n)),
  ];
  return [...own, ...children.flat()];
}

function argumentsOf(type, name) {
  const all = Reflect.getMetadata(ARGUMENTS, type, name) ?? {};
  return Object.entries(all).flatMap(([key, { data, schema }]) => {
    const kind = argumentKinds[key.split(':')[0]];
    return kind === undefined
      ? []
      : [{ kind, name: data ?? null, hasSchema: schema !== undefined, loose: loosePlaces(schema) }];
  });
}

function routesOf(controller) {
  const prefix = Reflect.getMetadata(PATH, controller) ?? '';
  return handlers(controller).flatMap(({ name, handler }) => {
    const paths = Reflect.getMetadata(PATH, handler);
    const method = Reflect.getMetadata(METHOD, handler);
    if (paths === undefined || method === undefined) return [];
    return [paths].flat().map((path) => ({
      handler: `${controller.name}.${name}`,
      method: RequestMethod[method].toLowerCase(),
      path: `/api/${[prefix, path].flat().join('/')}`.replace(/\/+/g, '/').replace(/\/$/, ''),
      access: accessOf(controller, handler),
      arguments: argumentsOf(controller, name),
      isIdempotent: Reflect.hasMetadata(IDEMPOTENT, handler),
    }));
  });
}

function messagesOf(gateway) {
  return handlers(gateway).flatMap(({ name, handler }) => {
    const message = Reflect.getMetadata(MESSAGE, handler);
    return message === undefined
      ? []
      : [{ handler: `${gateway.name}.${name}`, message, access: accessOf(gateway, handler) }];
  });
}

await visit(AppModule.register({}));
const routes = [...classes.controllers].flatMap(routesOf);
const messages = [...classes.gateways].flatMap(messagesOf);
console.log(JSON.stringify({ routes, messages }));
process.exit(0);

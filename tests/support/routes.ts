import { readdirSync } from 'node:fs';
import path from 'node:path';

const API = path.resolve(__dirname, '../../src/app/api');
type Handler = (request: Request, extra: { params: Promise<Record<string, string>> }) => Promise<Response> | Response;

interface Route {
  parts: string[];
  methods: Record<string, Handler>;
}

/** Every route handler of the API, found by method and address as the server finds them: `call(request)`. */
export async function routesOf(): Promise<(request: Request) => Promise<Response>> {
  const routes: Route[] = [];
  for (const file of readdirSync(API, { recursive: true, encoding: 'utf8' })) {
    if (!file.endsWith('route.ts')) continue;
    const methods = (await import(path.join(API, file))) as Record<string, Handler>;
    routes.push({ parts: ['api', ...path.dirname(file).split(path.sep)], methods });
  }
  // A fixed name goes before a parameter.
  routes.sort((a, b) => a.parts.filter(isParameter).length - b.parts.filter(isParameter).length);
  return async (request) => {
    const parts = new URL(request.url).pathname.split('/').filter(Boolean);
    const route = routes.find((one) => fits(one.parts, parts));
    const handler = route?.methods[request.method];
    if (!route || !handler) return new Response(null, { status: route ? 405 : 404 });
    const params = Object.fromEntries(
      route.parts.flatMap((part, at) => (isParameter(part) ? [[part.slice(1, -1), parts[at]!]] : [])),
    );
    return handler(request, { params: Promise.resolve(params) });
  };
}

const isParameter = (part: string) => part.startsWith('[');
const fits = (pattern: readonly string[], parts: readonly string[]) =>
  pattern.length === parts.length && pattern.every((part, at) => isParameter(part) || part === parts[at]);

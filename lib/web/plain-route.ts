import 'server-only';
import { problemResponse } from './problem';
import { newReference, readJson, requireOwnOrigin } from './request';

/**
 * For the few addresses that open no work of their own because the service behind them does
 * (choosing a role acts before there is an actor). Everything else is made by `route`.
 */
export function plainRoute(act: string, run: (body: unknown, request: Request) => Promise<unknown>): (request: Request) => Promise<Response> {
  return async (request) => {
    const reference = newReference();
    try {
      requireOwnOrigin(request);
      return Response.json(await run(await readJson(request), request), { headers: { 'cache-control': 'no-store' } });
    } catch (error) {
      return problemResponse(error, { reference, act });
    }
  };
}

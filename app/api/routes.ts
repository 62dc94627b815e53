import type { RouteTable } from '@/lib/web/openapi';

/** Every address of the API. tests/house.test.ts fails when a route.ts is missing here. */
export const routes: RouteTable = {};

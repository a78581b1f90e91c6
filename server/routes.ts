import type { Config } from './config';
import { sessionRoutes } from './features/auth';
import { benchRoutes } from './features/benches';
import { cabinetRoutes } from './features/cabinet';
import { exchangeRoutes } from './features/exchange';
import { fileRoutes } from './features/files';
import { homeRoutes } from './features/home';
import { labRoutes } from './features/labs';
import { protocolRoutes } from './features/protocols';
import { relianceRoutes } from './features/reliance';
import { runRoutes } from './features/runs';
import type { Route } from './http/route';

/** Every route of the API: the router is made from this list, and so is the permission table of the tests. */
export function allRoutes(config: Pick<Config, 'secure' | 'sessionSecret'>): readonly Route[] {
  return [
    ...sessionRoutes(config),
    ...labRoutes(config),
    ...cabinetRoutes(),
    ...exchangeRoutes(),
    ...fileRoutes(),
    ...benchRoutes(),
    ...protocolRoutes(),
    ...relianceRoutes(),
    ...runRoutes(),
    ...homeRoutes(),
  ];
}

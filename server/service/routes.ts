import { sql } from 'drizzle-orm';
import { healthEndpoints } from '../../shared/record.ts';
import type { Mount } from '../route.ts';
import { describeApi } from './openapi.ts';

/** Anybody may ask for the health: an answer holds this long, ms, so that asking often costs nothing. */
const freshFor = 2_000;
const patience = 2_000;

export function serviceRoutes({ open, services }: Mount): void {
  let last: { at: number; database: 'ok' | 'down'; files: 'ok' | 'down' } | null = null;

  open(healthEndpoints.health, async () => {
    if (!last || Date.now() - last.at > freshFor) {
      const [database, files] = await Promise.all([
        stateOf(services.database.execute(sql`select 1`)),
        stateOf(services.files.check()),
      ]);
      last = { at: Date.now(), database, files };
    }
    const { database, files } = last;
    const ok = database === 'ok' && files === 'ok' && !services.closing();
    // Not a problem body: whoever watches the health wants it most when it is bad.
    return { body: { ok, database, files, version: services.version }, status: ok ? 200 : 503 };
  });

  let description: Record<string, unknown> | null = null;
  open(healthEndpoints.openapi, async () => {
    description ??= describeApi(services.version);
    return { body: description };
  });
}

async function stateOf(check: Promise<unknown>): Promise<'ok' | 'down'> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<'down'>((resolve) => {
    timer = setTimeout(() => resolve('down'), patience);
  });
  try {
    return await Promise.race([check.then(() => 'ok' as const), late]);
  } catch {
    return 'down';
  } finally {
    clearTimeout(timer);
  }
}

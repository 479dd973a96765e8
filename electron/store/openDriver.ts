/** Which SQL engine a host uses. */
import type { Driver, DriverRequest } from './driver.ts';

/** Electron brings SQLite with its own runtime; on Node the compiled package is used. */
export async function openDriver(request: DriverRequest): Promise<Driver> {
  if (process.versions['electron'] !== undefined) {
    const { openBuiltIn } = await import('./builtInSqlite.ts');
    return await openBuiltIn(request);
  }
  const { openBetter } = await import('./betterSqlite.ts');
  return await openBetter(request);
}

/** From an unchecked message to the answer of a service. */
import type { z } from 'zod';
import { quoted } from '../../core/api.ts';
import type { HostAnswer, HostMethod, Trouble } from '../../core/host.ts';
import type { CallContext, Services } from '../services/services.ts';
import { schemas } from './schemas.ts';

/** A message that is not of the contract is refused before any service sees it. Never throws. */
export async function dispatch(
  services: Services,
  method: unknown,
  ask: unknown,
  context: CallContext,
): Promise<HostAnswer<unknown>> {
  const schema = typeof method === 'string' ? schemas.get(method) : undefined;
  if (schema === undefined) {
    return refused(`There is no method ${typeof method === 'string' ? quoted(method) : 'without a name'}.`);
  }
  const name = method as HostMethod;
  try {
    const checked = schema.safeParse(ask);
    if (!checked.success) return refused(malformed(name, checked.error));
    return await services.methods[name](checked.data as never, context);
  } catch (error) {
    return defect(services, name, error);
  }
}

function refused(message: string): HostAnswer<never> {
  return trouble({ code: 'refused', message: `${message} Nothing was done.` });
}

function malformed(method: HostMethod, error: z.ZodError): string {
  const told = error.issues.slice(0, 3).map(({ path, message }) => {
    return path.length === 0 ? message : `${path.map(String).join('.')}: ${message}`;
  });
  return `The message to ${method} is malformed: ${told.join('; ').slice(0, 500)}.`;
}

function defect(services: Services, method: HostMethod, error: unknown): HostAnswer<never> {
  const what = error instanceof Error ? (error.stack ?? error.message) : String(error);
  try {
    services.log(`defect in ${method}: ${what}`);
  } catch {
    // A log that cannot be written must not keep the answer from the page.
  }
  return trouble({
    code: 'defect',
    message: `The program itself failed at this (${method}); that is a defect of ours. What was kept before stays kept.`,
  });
}

function trouble(trouble: Trouble): HostAnswer<never> {
  return { ok: false, trouble };
}

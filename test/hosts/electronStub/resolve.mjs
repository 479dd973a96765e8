export async function resolve(name, context, next) {
  if (name !== 'electron') return next(name, context);
  return { url: new URL('./electron.mjs', import.meta.url).href, shortCircuit: true };
}

/*
 * zod writes itself faster readers with `new Function`, and first tries whether it may. Our content policy forbids that
 * and every try is reported as a violation, so zod is told before any of its code runs: it keeps its settings here.
 */
Object.assign(globalThis, { __zod_globalConfig: { jitless: true } });

export {};

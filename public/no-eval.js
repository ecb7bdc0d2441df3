// zod tries once whether it may compile its checks with eval; our content policy forbids it and the browser reports the try.
// Told before its module is read, it does not try. The bundler reads that module before our own, so this is a file apart.
globalThis.__zod_globalConfig = { jitless: true };

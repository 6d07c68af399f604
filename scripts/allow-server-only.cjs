// Scripts run the server's own modules outside a bundle. The marker package that keeps them out of the browser throws there unless told where it is.
const Module = require('node:module')
const path = require('node:path')

const resolve = Module._resolveFilename
const empty = path.join(__dirname, '../node_modules/server-only/empty.js')
Module._resolveFilename = (request, ...rest) => (request === 'server-only' ? empty : resolve(request, ...rest))

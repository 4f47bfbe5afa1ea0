/**
 * Loaded into the server by `node --import`. The channel to the starter closes when the starter ends, whatever way it
 * ends, kill -9 included; the server then stops in order instead of staying behind on its port.
 */
process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'));
process.channel?.unref();

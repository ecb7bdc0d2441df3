// Loaded before a program the launcher starts: when the launcher is gone, however it went, stop too.
if (process.channel) {
  process.on('disconnect', () => process.kill(process.pid, 'SIGTERM'));
  process.channel.unref();
}

// Loaded with --import into every service the scripts start. The channel to the parent closes when the parent ends,
// however it ends, so a service never outlives a killed `npm start`.
const graceMs = 10_000;

if (process.channel) {
  process.once('disconnect', () => {
    setTimeout(() => process.exit(1), graceMs).unref();
    process.kill(process.pid, 'SIGTERM');
  });
  // The listener must not keep a finished program alive.
  process.channel.unref();
}

/*
 * Loaded before a part of the installation (node --import): when the process that started it is gone, even by
 * kill -9, the channel between them closes, and the part ends too instead of running on unseen.
 */
if (process.channel) {
  process.once('disconnect', () => {
    setTimeout(() => process.exit(1), 5_000).unref();
    process.kill(process.pid, 'SIGTERM');
  });
  process.channel.unref();
}

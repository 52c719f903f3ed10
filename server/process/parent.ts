/**
 * Ends this process by SIGTERM, so with its own drain, when the script that started it is gone, also by kill -9.
 * A process that was started in another way, without a channel to its parent, is left alone.
 */
export function endWithParent(): void {
  if (!process.connected) return;
  process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'));
  // A listener alone would keep the process running after its work is done.
  process.channel?.unref();
}

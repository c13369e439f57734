// Loaded into the processes that the commands start (node --import). When the command that started them is
// gone without having stopped them (kill -9), the channel to it closes, and they stop by themselves.
// Processes that these fork in turn load this file too, but are their parent's own business.
if (process.env.LAMPWRIGHT_SUPERVISED) {
  delete process.env.LAMPWRIGHT_SUPERVISED;
  const stop = () => process.kill(process.pid, 'SIGTERM');
  // The starter may be gone before this line is reached; the event is then over already.
  if (!process.connected) stop();
  process.on('disconnect', stop);
  // The channel alone must not keep a process alive.
  process.channel?.unref();
}

// Loaded into the server ahead of its own code: when the start command dies without a word (kill -9),
// the server goes down in good order and does not keep the port.
process.on('disconnect', () => process.kill(process.pid, 'SIGTERM'))
process.channel?.unref()

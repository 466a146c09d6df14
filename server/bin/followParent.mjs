// Preloaded into a program that must not outlive the one that started it, even when that one is killed outright.
process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'));

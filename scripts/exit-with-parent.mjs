// Preloaded into child processes: when the process that started them dies, even by kill -9, they end too.
// Programs that such a child starts in turn inherit this preload and have channels of their own: those are left alone.
if (process.channel && process.ppid === Number(process.env.EXIT_WITH_PARENT)) {
  process.on("disconnect", () => process.exit(1));
  // Listening must not keep a program alive that has done its work.
  process.channel.unref();
}

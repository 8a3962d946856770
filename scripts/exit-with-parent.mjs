// Preloaded into child processes: when the process that started them dies, even by kill -9, they end too.
if (process.channel) {
  process.on("disconnect", () => process.exit(1));
  // Listening must not keep a program alive that has done its work.
  process.channel.unref();
}

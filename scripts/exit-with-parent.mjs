// Loaded into every child of start.mjs: when the parent is gone, however it went, the child ends too.
process.on('disconnect', () => process.exit(0));
process.channel?.unref();

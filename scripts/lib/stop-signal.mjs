const controller = new AbortController();

/** Aborted at Ctrl-C or when something asks the program to end. Further requests change nothing: the clean-up goes on. */
export const stopSignal = controller.signal;

for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(name, () => controller.abort());

// The real package throws outside a React server; tests and scripts run server code on purpose.
export {};

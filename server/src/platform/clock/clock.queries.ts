export const NOW = `SELECT app_now() AS now`;

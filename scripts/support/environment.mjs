const SETTINGS = ['DATABASE_URL', 'DATABASE_OWNER_URL', 'SMTP_URL', 'PORT', 'STEPWELL_DEMO', 'STEPWELL_URL'];

/** An environment without the settings of an installation that this machine may have. */
export function withoutInstallationSettings(environment) {
  const others = { ...environment };
  for (const name of SETTINGS) delete others[name];
  return others;
}

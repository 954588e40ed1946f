/** A browser's user-agent text as 'Firefox on Linux'; the whole text where nothing is recognised. */
export function browserWords(agent: string): string {
  const browser = browsers.find(([pattern]) => pattern.test(agent))?.[1];
  const system = systems.find(([pattern]) => pattern.test(agent))?.[1];
  if (!browser) return agent.slice(0, 60) || 'unknown browser';
  return system ? `${browser} on ${system}` : browser;
}

// More particular texts first: most browsers also carry the names of others.
const browsers: [RegExp, string][] = [
  [/Edg\//, 'Edge'],
  [/Firefox\//, 'Firefox'],
  [/Chrome\//, 'Chromium'],
  [/Safari\//, 'Safari'],
  [/nightcone/i, 'the command line'],
];
const systems: [RegExp, string][] = [
  [/Android/, 'Android'],
  [/iPhone|iPad/, 'iOS'],
  [/Windows/, 'Windows'],
  [/Mac OS X/, 'macOS'],
  [/Linux|X11/, 'Linux'],
];

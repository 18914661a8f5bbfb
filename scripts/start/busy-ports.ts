import { isPortFree } from '../../docker-free-dev/ports.ts';
import { PORT_VARIABLES, type Ports, type StartSettings } from './settings.ts';

/** The ports this start will listen on. */
function portsInUse(settings: StartSettings): (keyof Ports)[] {
  const { outside, dev } = settings;
  const names: (keyof Ports)[] = ['web', 'metrics', 'workerMetrics'];
  if (!outside.database) names.push('database');
  if (!outside.store) names.push('store');
  if (!outside.smtp) names.push('smtp', 'mails');
  if (dev) names.push('devApi');
  return names;
}

/** @throws Error naming each port that somebody else holds, and the variable that moves ours */
export async function requireFreePorts(settings: StartSettings): Promise<void> {
  const seen = new Map<number, string>();
  const sentences: string[] = [];
  for (const name of portsInUse(settings)) {
    const [port, [variable]] = [settings.ports[name], PORT_VARIABLES[name]];
    const double = seen.get(port);
    if (double) sentences.push(`${variable} and ${double} are both ${port}. Give one of them another port.`);
    else if (!(await isPortFree(port))) sentences.push(`Port ${port} is in use by another program. Set ${variable} to a free port.`);
    seen.set(port, variable);
  }
  if (sentences.length > 0) throw new Error(sentences.join('\n'));
}

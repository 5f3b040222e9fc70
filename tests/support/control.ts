import { request } from 'node:http';
import { requireServices } from '@/tests/support/services';

export type ServiceName = 'mariadb' | 'redis' | 'object-store' | 'mail';
export type ServiceVerb = 'stop' | 'kill' | 'start' | 'restart' | 'lose';

/**
 * Stops, kills (SIGKILL), starts or restarts one of the throw-away services; `lose` kills Redis and brings it back
 * empty. Resolves when it is done (a started service answers again), with the processes that run now. Whoever stops a
 * service starts it again before the test file ends.
 */
export function control(service: ServiceName, verb: ServiceVerb): Promise<{ name: string; pid: number }[]> {
  requireServices();
  return new Promise((resolve, reject) => {
    const call = request(
      { socketPath: process.env.OUTFOLD_CONTROL, method: 'POST', path: `/${service}/${verb}` },
      (response) => {
        let text = '';
        response.setEncoding('utf8');
        response.on('data', (part: string) => (text += part));
        response.on('end', () => {
          if (response.statusCode === 200) resolve(JSON.parse(text) as { name: string; pid: number }[]);
          else reject(new Error(`${service} could not ${verb}: ${text}`));
        });
      },
    );
    call.on('error', reject);
    call.end();
  });
}

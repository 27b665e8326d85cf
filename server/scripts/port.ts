import { createServer } from 'node:net';

/** Whether nobody listens on this loopback port. */
export function isPortFree(port: number): Promise<boolean> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', (error: NodeJS.ErrnoException) => {
      if (error.code === 'EADDRINUSE' || error.code === 'EACCES') resolve(false);
      else reject(error);
    });
    probe.listen({ host: '127.0.0.1', port, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/** @throws Error that names the port, what it is for and the variable that moves it. */
export async function requireFreePort(port: number, purpose: string, variable: string): Promise<void> {
  if (await isPortFree(port)) return;
  throw new Error(
    `Port ${port}, meant for ${purpose}, is taken by another program or not allowed. ` +
      `Stop that program, or choose another port with ${variable}=… npm start.`,
  );
}

/** A port that is free now, chosen by the system. */
export function findFreePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen({ host: '127.0.0.1', port: 0 }, () => {
      const address = probe.address();
      probe.close(() => {
        if (address && typeof address === 'object') resolve(address.port);
        else reject(new Error('The system gave no port.'));
      });
    });
  });
}

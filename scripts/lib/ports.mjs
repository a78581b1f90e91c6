import { createServer } from 'node:net';

/**
 * Whether nobody listens on this port of the machine itself, on either of the two addresses that "localhost" can mean.
 * @param {number} port
 */
export async function isPortFree(port) {
  return (await canListen(port, '127.0.0.1')) && (await canListen(port, '::1'));
}

/**
 * The first free port at or above `preferred`.
 * @param {number} preferred
 * @param {readonly number[]} [except] ports already promised to somebody else
 */
export async function freePortFrom(preferred, except = []) {
  for (let port = preferred; port < preferred + 200 && port < 65536; port += 1) {
    if (!except.includes(port) && (await isPortFree(port))) return port;
  }
  return anyFreePort();
}

/** A free port of the system's choosing. @returns {Promise<number>} */
export function anyFreePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() => {
        if (address === null || typeof address === 'string') reject(new Error('the system gave no port'));
        else resolve(address.port);
      });
    });
  });
}

/**
 * @param {number} port
 * @param {string} host
 * @returns {Promise<boolean>}
 */
function canListen(port, host) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', (/** @type {NodeJS.ErrnoException} */ error) => {
      // A machine without IPv6 has nobody listening there either.
      resolve(error.code === 'EADDRNOTAVAIL' || error.code === 'EAFNOSUPPORT');
    });
    probe.listen({ port, host, exclusive: true }, () => {
      probe.close(() => resolve(true));
    });
  });
}

import { connect, createServer } from "node:net";
import { Refusal } from "./say.mjs";

/** A server greets with a packet whose first byte after the header is the protocol's version. */
const PROTOCOL_VERSION = 10;
const HEADER_BYTES = 4;

/**
 * Opens a port for a moment. @throws what the system says when it may not be opened
 * @param {string} host
 * @param {number} port 0 for any
 * @returns {Promise<number>} the port
 */
function tryPort(host, port) {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once("error", reject);
    server.listen({ host, port, exclusive: true }, () => {
      const address = server.address();
      server.close(() => resolve(typeof address === "object" && address !== null ? address.port : port));
    });
  });
}

export const findFreePort = () => tryPort("127.0.0.1", 0);

/** @param {string} host @param {number} port @returns {Promise<boolean>} */
export const isPortFree = (host, port) =>
  tryPort(host, port).then(
    () => true,
    () => false,
  );

/**
 * Holds the service's address against what the machine has, before anything is started for it.
 * @param {string} host
 * @param {number} port
 */
export async function checkAddress(host, port) {
  try {
    await tryPort(host, port);
  } catch (error) {
    throw explainListening(error, host, port);
  }
}

/**
 * What to do about an address that cannot be listened on; any other error as it is.
 * @param {unknown} error
 * @param {string} host
 * @param {number} port
 * @returns {unknown}
 */
export function explainListening(error, host, port) {
  const code = error instanceof Error && "code" in error ? error.code : undefined;
  if (code === "EADDRINUSE")
    return new Refusal(
      `Port ${port} on ${host} is taken by another program. Choose another one:\n\n  PORT=${port + 1} npm start`,
    );
  if (code === "EACCES")
    return new Refusal(
      `Port ${port} may not be opened by this user. Choose one above 1023:\n\n  PORT=4100 npm start`,
    );
  if (code === "EADDRNOTAVAIL" || code === "ENOTFOUND" || code === "EAI_AGAIN")
    return new Refusal(`HOST=${host} is no address of this machine. 127.0.0.1 and 0.0.0.0 always are.`);
  return error;
}

/**
 * Whether a MariaDB server answers at a socket: it greets only after its accounts are in order.
 * @param {string} socketPath
 * @returns {Promise<boolean>}
 */
export function greetsAsDatabase(socketPath) {
  return new Promise((resolve) => {
    const socket = connect(socketPath);
    socket.once("data", (bytes) => {
      resolve(bytes[HEADER_BYTES] === PROTOCOL_VERSION);
      socket.destroy();
    });
    socket.once("error", () => resolve(false));
    socket.once("close", () => resolve(false));
  });
}

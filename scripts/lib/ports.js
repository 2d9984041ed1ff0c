/** Ports of the loopback interface. */
const net = require('node:net');
const { Refusal } = require('./lifecycle');

const host = '127.0.0.1';
const firstPort = 4600;

/** Listens for a moment: gives the port, or null when it is taken. 0 asks for any free one. */
function probePort(port) {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', (error) => (error.code === 'EADDRINUSE' ? resolve(null) : reject(error)));
    server.listen(port, host, () => {
      const chosen = server.address().port;
      server.close(() => resolve(chosen));
    });
  });
}

function parsePort(text) {
  const port = Number(text);
  if (!/^\d+$/.test(text) || port < 1 || port > 65535)
    throw new Refusal(`PORT is “${text}”; it must be a whole number from 1 to 65535.`);
  return port;
}

/** The port that was asked for, which must be free, or the next free one from the first. */
async function choosePort(asked, first = firstPort) {
  if (asked) {
    const port = await probePort(parsePort(asked));
    if (port === null)
      throw new Refusal(`Port ${asked} is taken; set PORT to another one, or leave it out.`);
    return port;
  }
  for (let port = first; port < first + 1000; port += 1)
    if ((await probePort(port)) !== null) return port;
  throw new Refusal(`No port from ${first} to ${first + 999} is free; set PORT to one that is.`);
}

module.exports = { host, probePort, choosePort };

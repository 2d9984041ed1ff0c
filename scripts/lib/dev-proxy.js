/** One address for both sides: the API goes to the server, everything else to Metro. */
const http = require('node:http');
const net = require('node:net');
const { host } = require('./ports');

function forwardRequest(request, response, port) {
  const { method, url: path, headers } = request;
  const upstream = http.request({ host, port, method, path, headers }, (answer) => {
    response.writeHead(answer.statusCode, answer.headers);
    answer.pipe(response);
  });
  upstream.on('error', (error) => {
    if (!response.headersSent) response.writeHead(502, { 'content-type': 'text/plain' });
    response.end(`Nothing answers on port ${port} yet (${error.code}); try again in a moment.\n`);
  });
  request.pipe(upstream);
}

/** Web sockets carry Metro's reloads: the request is sent on as it came, then both ends are joined. */
function forwardSocket(request, socket, head, port) {
  const upstream = net.connect(port, host, () => {
    const headers = request.rawHeaders.map((text, index) =>
      index % 2 === 0 ? `${text}: ` : `${text}\r\n`,
    );
    upstream.write(`${request.method} ${request.url} HTTP/1.1\r\n${headers.join('')}\r\n`);
    upstream.write(head);
    upstream.pipe(socket).pipe(upstream);
  });
  const close = () => [upstream, socket].forEach((end) => end.destroy());
  upstream.on('error', close);
  socket.on('error', close);
}

function startProxy(port, { serverPort, metroPort }) {
  const target = ({ url }) => (/^\/api(\/|$)/.test(url) ? serverPort : metroPort);
  const proxy = http.createServer((request, response) =>
    forwardRequest(request, response, target(request)),
  );
  proxy.on('upgrade', (request, socket, head) =>
    forwardSocket(request, socket, head, target(request)),
  );
  return new Promise((resolve, reject) => {
    proxy.once('error', reject);
    proxy.listen(port, host, () => resolve(proxy));
  });
}

module.exports = { startProxy };

/* global describe, it, expect, expectAsync */
import net from 'node:net';
import {choosePort} from './choose-port.mjs';

describe('the port of npm start', () => {
  async function whileTaken(run) {
    const server = net.createServer().listen(0, '127.0.0.1');
    await new Promise((resolve) => server.once('listening', resolve));
    try {
      await run(server.address().port);
    } finally {
      await new Promise((resolve) => server.close(resolve));
    }
  }

  it('is refused in one line when the one asked for is taken', async () => {
    await whileTaken(async (port) => {
      await expectAsync(choosePort(String(port))).toBeRejectedWithError(
        new RegExp(`Port ${port} is taken`),
      );
    });
  });

  it('is refused when it is no port', async () => {
    await expectAsync(choosePort('seven')).toBeRejectedWithError(/not "seven"/);
    await expectAsync(choosePort('70000')).toBeRejectedWithError(/1 to 65535/);
  });

  it('is the next free one when nobody asked and the default is taken, which is said', async () => {
    const said = [];
    const first = await choosePort(undefined, () => {});
    const server = net.createServer().listen(first, '127.0.0.1');
    await new Promise((resolve) => server.once('listening', resolve));

    const second = await choosePort('', (line) => said.push(line));
    await new Promise((resolve) => server.close(resolve));

    expect(second).toBeGreaterThan(first);
    expect(said.join()).toContain(String(second));
  });
});

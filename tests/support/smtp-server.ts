import { createServer, type Socket } from 'node:net';

export type TakenMail = { readonly to: readonly string[]; readonly text: string };

type Behaviour = {
  /** The answer to a recipient; a code that begins with 4 or 5 refuses. */
  answerTo: (address: string) => string;
  /** Cuts the connection after a mail was stored and before that is said. */
  cutAfterData: boolean;
  /** Holds back the answer to a mail until this settles. */
  hold: Promise<void> | null;
};

export type SmtpServer = {
  readonly port: number;
  readonly taken: TakenMail[];
  readonly behaviour: Behaviour;
  readonly stop: () => Promise<void>;
};

/** As much of RFC 5321 as it takes to receive mail, on loopback, with faults that a test can switch on. */
export async function startSmtpServer(port = 0): Promise<SmtpServer> {
  const taken: TakenMail[] = [];
  const behaviour: Behaviour = { answerTo: () => '250 ok', cutAfterData: false, hold: null };
  const sockets = new Set<Socket>();

  const server = createServer((socket) => {
    sockets.add(socket);
    socket.on('close', () => sockets.delete(socket)).on('error', () => socket.destroy());
    const say = (line: string) => socket.write(`${line}\r\n`);
    let recipients: string[] = [];
    let inData = false;
    let pending = '';

    const finish = async (text: string) => {
      taken.push({ to: recipients, text });
      if (behaviour.cutAfterData) return void socket.destroy();
      await behaviour.hold;
      say('250 stored');
    };
    const obey = (line: string) => {
      const verb = line.slice(0, 4).toUpperCase();
      if (verb === 'RCPT') {
        const address = /<(.*)>/.exec(line)?.[1] ?? '';
        const answer = behaviour.answerTo(address);
        if (answer.startsWith('2')) recipients.push(address);
        return say(answer);
      }
      if (verb === 'MAIL' || verb === 'RSET') recipients = [];
      if (verb === 'DATA') inData = true;
      if (verb === 'QUIT') return void socket.end('221 bye\r\n');
      say(verb === 'DATA' ? '354 go on' : '250 ok');
    };

    say('220 test');
    socket.setEncoding('utf8').on('data', (chunk: string) => {
      pending += chunk;
      for (;;) {
        const end = inData ? '\r\n.\r\n' : '\r\n';
        const at = pending.indexOf(end);
        if (at < 0) return;
        const part = pending.slice(0, at);
        pending = pending.slice(at + end.length);
        if (inData) {
          inData = false;
          void finish(part);
        } else obey(part);
      }
    });
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', resolve);
  });
  const address = server.address();
  return {
    port: address && typeof address === 'object' ? address.port : 0,
    taken,
    behaviour,
    stop: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        for (const socket of sockets) socket.destroy();
      }),
  };
}

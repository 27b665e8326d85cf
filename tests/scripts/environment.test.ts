import { describe, expect, it } from 'vitest';
import { EnvironmentError, readLauncherEnvironment, readServerEnvironment } from '../../server/environment.ts';

const secrets = { STEMMA_DB_PASSWORD: 'x'.repeat(48), STEMMA_SESSION_SECRET: 'y'.repeat(64) };

function sentencesOf(read: () => unknown): readonly string[] {
  try {
    read();
  } catch (error) {
    if (error instanceof EnvironmentError) return error.sentences;
    throw error;
  }
  return [];
}

describe('the environment', () => {
  it('needs nothing set: ports, folder and demo have defaults', () => {
    expect(readLauncherEnvironment({})).toMatchObject({
      appPort: 4780,
      databasePort: 4781,
      smtpPort: 4782,
      mailPagePort: 4783,
      dataFolder: `${process.cwd()}/.stemma`,
      withDemo: true,
      publicAddress: 'http://127.0.0.1:4780',
    });
  });

  it.each([
    [{ STEMMA_PORT: 'http' }, 'STEMMA_PORT must be a port number from 1 to 65535, but it is "http".'],
    [{ STEMMA_DB_PORT: '70000' }, 'STEMMA_DB_PORT must be a port number from 1 to 65535, but it is "70000".'],
    [{ STEMMA_DEMO: 'maybe' }, 'STEMMA_DEMO must be yes or no, but it is "maybe".'],
    [{ STEMMA_HOST: 'here' }, 'STEMMA_HOST must be an IP address such as 127.0.0.1, but it is "here".'],
    [
      { STEMMA_PUBLIC_ADDRESS: 'stemma' },
      'STEMMA_PUBLIC_ADDRESS must be an address such as https://stemma.example.test, but it is "stemma".',
    ],
    [{ STEMMA_DB_NAME: 'a`b' }, 'STEMMA_DB_NAME must start with stemma and hold only a-z, 0-9 and _, but it is "a`b".'],
    [
      { STEMMA_LOG_LEVEL: 'loud' },
      'STEMMA_LOG_LEVEL must be fatal, error, warn, info, debug or silent, but it is "loud".',
    ],
    [{ STEMMA_PROT: '80' }, 'STEMMA_PROT is not a variable that Stemma knows; see the table in README.md.'],
    [
      { STEMMA_SMTP_PORT: '4780' },
      'STEMMA_SMTP_PORT (incoming mail) and STEMMA_PORT (the app) are both 4780; give each its own port.',
    ],
  ])('says in one sentence what is wrong with %o', (source, sentence) => {
    expect(sentencesOf(() => readLauncherEnvironment(source))).toEqual([sentence]);
  });

  it('names every wrong value at once', () => {
    const sentences = sentencesOf(() => readLauncherEnvironment({ STEMMA_PORT: '0', STEMMA_DEMO: 'perhaps' }));

    expect(sentences).toHaveLength(2);
  });

  it('takes an empty variable as one that is not set', () => {
    expect(readLauncherEnvironment({ STEMMA_PORT: '' }).appPort).toBe(4780);
  });

  it('refuses to run the server without its secrets, naming both', () => {
    const sentences = sentencesOf(() => readServerEnvironment({}));

    expect(sentences.map((sentence) => sentence.split(' ')[0])).toEqual([
      'STEMMA_DB_PASSWORD',
      'STEMMA_SESSION_SECRET',
    ]);
  });

  it('never repeats a secret in a sentence', () => {
    const sentences = sentencesOf(() => readServerEnvironment({ ...secrets, STEMMA_SESSION_SECRET: 'short-secret' }));

    expect(sentences).toEqual(['STEMMA_SESSION_SECRET must be at least 32 characters long.']);
  });

  it('drops the slash at the end of the public address, so links in mails have one', () => {
    const { publicAddress } = readServerEnvironment({
      ...secrets,
      STEMMA_PUBLIC_ADDRESS: 'https://stemma.example.test/',
    });

    expect(publicAddress).toBe('https://stemma.example.test');
  });
});

import path from 'node:path';
import { webAnswers } from './answers';
import { root } from './folders';
import { defineService, plainEnvironment, type Service, type ServiceEvents } from './service';

export interface MailOptions {
  folder: string;
  smtpPort: number;
  pagePort: number;
  logFile: string;
  events?: ServiceEvents;
}

/** Catches every mail of a local run and shows it on a page; nothing leaves the machine. */
export function defineMail({ folder, smtpPort, pagePort, logFile, events }: MailOptions): Service {
  const url = `http://127.0.0.1:${pagePort}`;
  const options = {
    smtp: smtpPort,
    ip: '127.0.0.1',
    web: pagePort,
    'web-ip': '127.0.0.1',
    'mail-directory': folder,
    'max-emails': 2000,
  };
  return defineService({
    name: 'mail catcher',
    url,
    command: [
      process.execPath,
      path.join(root, 'node_modules/maildev/dist/bin/maildev.js'),
      ...Object.entries(options).flatMap(([name, value]) => [`--${name}`, String(value)]),
    ],
    cwd: folder,
    env: plainEnvironment(),
    logFile,
    answers: () => webAnswers(`${url}/api/healthz`, (status) => status === 200),
    events,
  });
}

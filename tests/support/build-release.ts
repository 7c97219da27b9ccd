// The build step of `npm test`, apart from the browser tests so that it is counted and shown on its own.
import path from 'node:path';
import { outFolder } from './out-folder';
import { buildApp } from '@/docker/local/build-app';

const { built } = await buildApp(path.join(outFolder, 'next-build.log'));
console.log(built ? 'The application was built.' : 'These sources are built already.');

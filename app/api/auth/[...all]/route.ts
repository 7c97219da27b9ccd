import { toNextJsHandler } from 'better-auth/next-js';
import { auth } from '@/lib/auth/auth';

const handle = (request: Request) => auth().handler(request);

export const { GET, POST } = toNextJsHandler(handle);

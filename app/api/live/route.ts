import { json } from '@/lib/http/route';

export const dynamic = 'force-dynamic';

/** The process runs and answers. Says nothing about what it needs: /api/ready does. */
export const GET = () => json({ live: true });

// Runs the demo seed in a process of its own and hands the sign-ins to the one that asked.
import { seedDemo } from '@/db/seed/seed';

const people = await seedDemo();
await new Promise((resolve) => process.send!(people, resolve));
process.exit(0);

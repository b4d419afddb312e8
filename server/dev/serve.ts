import { serve } from '../main.ts';

// The product's server as a child of the set-up: says where it listens, and leaves when its parent is gone.
const { address } = await serve();
process.send?.({ address });
process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'));

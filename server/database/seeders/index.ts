/**
 * Makes the demo: invented people, laboratories, lots and deals, through the API and the commands, so that what a visitor
 * finds is what the product itself has written. The stand-ins are driven by their pages' own buttons.
 */
// One storyteller does in a minute what a village does in two months: the limits are for the public.
process.env.RATE_LIMIT_FACTOR = '1000';
process.env.LOG_LEVEL = 'warn';

// The environment is read once, at the first import of the server.
const { seedDemo } = await import('./seed-demo.ts');
await seedDemo();

export {};

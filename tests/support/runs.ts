/** How many cases a property or fuzz test tries: few in `npm test`, many in `npm run deep`. */
export const runs = (quick: number, deep: number): number => (process.env.CINDERPATH_DEEP === '1' ? deep : quick);

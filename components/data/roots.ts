/** Key roots that more than one noun invalidates: a decision on a revision shows in all of them. */
export const strategiesRoot = ['strategies'] as const;
export const revisionsRoot = ['revisions'] as const;
export const reviewsRoot = ['reviews'] as const;
export const cardsRoot = ['cards'] as const;
export const partsRoot = ['parts'] as const;
export const layoutsRoot = ['layouts'] as const;
export const cornerPlansRoot = ['corner-plans'] as const;
export const estimatesRoot = ['estimates'] as const;

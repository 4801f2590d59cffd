/** The engine writes numbers into sentences, the pages into tables: one set of rules serves both. */
export * from '../../../../shared/judgement/quantity-format';

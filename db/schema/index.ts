export * from './audit';
export * from './changes';
export * from './gain-sets';
export * from './machines';
export * from './mail';
export * from './people';

/** Every table, for the migration generator. */
export * from './people'
export * from './reactions'
export * from './rigs'
export * from './samples'
export * from './campaigns'
export * from './runs'
export * from './uploads'
export * from './results'

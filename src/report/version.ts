/** Version of the library as reports name it; a test keeps it equal to that of package.json. */
export const libraryVersion = "0.1.0";

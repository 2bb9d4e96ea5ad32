// Some packages offer only an "import" condition; jest resolves with "require" first and falls back to it.
module.exports = (request, options) => {
  try {
    return options.defaultResolver(request, options);
  } catch {
    return options.defaultResolver(request, {
      ...options,
      conditions: [...(options.conditions ?? []), 'import'],
    });
  }
};

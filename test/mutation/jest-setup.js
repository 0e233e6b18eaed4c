// One failing example is enough to kill a mutant; making it smaller would only take time.
require('fast-check').configureGlobal({ endOnFailure: true });

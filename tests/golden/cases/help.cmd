# The first screen that a user sees.
--help

# The version, as scripts read it.
--version

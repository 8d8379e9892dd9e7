"""What keeps a plugin's failure to the plugin: containment, a sealed study, guarded load kinds and report kinds.

A plugin is somebody's Python and runs in the same process, so this is a guard against mistakes, not against malice.
"""

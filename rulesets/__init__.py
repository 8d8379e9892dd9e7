"""The shipped rulesets, as YAML files beside this one."""

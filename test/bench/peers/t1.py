"""Character tables in floats with numpy."""
from clock import done, timed
from groups import GROUPS, table


def all_nine():
    for name, generators in GROUPS.items():
        if name == 'H4':
            timed('character table of H4', lambda: table(generators()))
        else:
            table(generators())


timed('character tables, nine groups', all_nine)
done()

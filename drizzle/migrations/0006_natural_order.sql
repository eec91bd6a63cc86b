-- Names sort as people count: "bolt 2" before "bolt 10", whatever the locale of the server. Two names of the same order are still two.
create collation natural_order (provider = icu, locale = 'und-u-kn-true');

[Version] 2.0
! The network of example 9 as Y parameters in siemens: not of the standard
# MHz Y MA R 75
[Number of Ports] 1
[Number of Frequencies] 5
[Network Data]
100 0.01346801346801347 4
200 0.01666666666666667 22
300 0.01885902876001886 45
400 0.03333333333333333 62
500 1.333333333333333 89
[End]

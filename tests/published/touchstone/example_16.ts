[Version] 2.0
! Mixed-mode network: the header of the example, with numbers of no meaning
# MHz Y RI
[Number of Ports] 6
[Number of Frequencies] 1
[Reference] 50 75 75 50 0.01 0.01
[Mixed-Mode Order] D2,3 D6,5 C2,3 C6,5 S4 S1
[Matrix Format] Lower
[Network Data]
5.00 11 0
     21 0 22 0
     31 0 32 0 33 0
     41 0 42 0 43 0 44 0
     51 0 52 0 53 0 54 0 55 0
     61 0 62 0 63 0 64 0 65 0 66 0
[End]

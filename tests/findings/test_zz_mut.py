import pytest
from dataclasses import replace
from tests.findings.test_laws import *
from tests.findings.conftest import records, lab_facts
import builder.engine.evidence as ee, builder.findings.plan.judging as jj, builder.findings.plan.evidence as ev
import os
M=os.environ['MUT']
if M=='limit':
    def old(values):
        return None if True else 0
    ee._limit_time=old
if M=='cap': jj.capped=lambda w:w
if M=='rank':
    from builder.engine.rank import Rank as R
    import builder.engine.verdict as v
    v.worst_rank=lambda r: list(r)[0]
if M=='thin':
    jj.allowed_under=lambda t,r: 10.0
if M=='below':
    import builder.findings.plan.exposures as x
    x.below=lambda e,b,t,c,*,porous: replace(e,low_s=0,mid_s=None,high_s=e.high_s*(t/1000))
